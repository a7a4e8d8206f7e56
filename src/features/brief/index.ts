export { headline, lead, type BriefFacts } from './sentences';
