export { KernelMemory, type KeptMatrix } from './memory';
