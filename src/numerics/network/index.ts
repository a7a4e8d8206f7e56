export { buildNetwork } from './build';
export { fromCsr, tieCount, totalWeight } from './csr';
export { components, componentMembers, type Components } from './components';
export { subnetwork } from './subnetwork';
