export { buildNetwork } from './build';
export { fromCsr, tieCount, totalWeight } from './csr';
export { components, componentMembers, type Components } from './components';
export { localityOrder } from './ordering';
export { subnetwork } from './subnetwork';
