export { briefOf, type BriefData } from './brief.server';
