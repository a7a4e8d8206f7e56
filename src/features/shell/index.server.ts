export { openPlace, type OpenPlace, type PlaceRequest } from './shell.server';
