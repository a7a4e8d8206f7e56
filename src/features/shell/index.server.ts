export { pagePlace } from './page.server';
export { openPlace, type OpenPlace, type PlaceRequest } from './shell.server';
