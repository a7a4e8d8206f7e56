export { attributesOf, loadArray, loadAttribute, loadLabels, loadNetwork, saveArray } from './arrays.server';
export { communityFor, snapshotFor } from './scope.server';
