export * from './files';
export { fileErrors } from './errors';
export { readSample, type Sample, type SampleTable } from './sample';
export { isGzip } from './sniff';
