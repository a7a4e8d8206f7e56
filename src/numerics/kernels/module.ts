import { compiledKernels } from './compiled';

type Rows = (lo: number, hi: number, ...rest: number[]) => void;

/** The compiled functions; what each does is said in assembly/kernels.ts. */
export interface Kernels {
  readonly rows: Rows;
  readonly rows8: Rows;
  readonly weigh8: Rows;
  readonly advance8: Rows;
  readonly direct8: Rows;
  readonly project: Rows;
  readonly combine: Rows;
  readonly rotate: Rows;
}

export const kernelNames = [
  'rows',
  'rows8',
  'weigh8',
  'advance8',
  'direct8',
  'project',
  'combine',
  'rotate',
] as const satisfies readonly (keyof Kernels)[];

let compiled: WebAssembly.Module | null = null;

export function kernelModule(): WebAssembly.Module {
  compiled ??= new WebAssembly.Module(Uint8Array.from(atob(compiledKernels), (one) => one.charCodeAt(0)));
  return compiled;
}

export function instantiate(memory: WebAssembly.Memory): Kernels {
  const { exports } = new WebAssembly.Instance(kernelModule(), { env: { memory } });
  return exports as unknown as Kernels;
}
