export type { Shape } from './compute';
export { decodeNetwork, encodeNetwork, NETWORK_TYPE, type DecodedNetwork } from './binary';
export { networkOperations, type CommunityView, type SnapshotView } from './network';
