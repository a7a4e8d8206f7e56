export { ReadingApp, type ReadingProps } from './ReadingApp';
export { ReadingsApp, type ReadingsProps } from './ReadingsApp';
