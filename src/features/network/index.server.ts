export { auditExport } from './audit.server';
export { graphFile } from './graph-files.server';
export { landSnapshot, type Landing } from './land.server';
export { networkPicture, savePicture } from './picture.server';
export { attributesOf, loadArray, loadAttribute, loadLabels, loadNetwork, saveArray } from './arrays.server';
export { communityFor, snapshotFor } from './scope.server';
export { createCommunity, listCommunities, listSnapshots, presentSnapshot } from './snapshots.server';
export { spectrumOf } from './spectrum.server';
export { tiesCsv } from './ties.server';
