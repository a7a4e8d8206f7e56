import { Worker } from 'node:worker_threads';
import { kernelModule, kernelNames, type Kernels } from './module';

/**
 * The thread beside this one. It sleeps on word 0 of the control block, runs the kernel that stands there on its half
 * of the rows, and puts word 1 up when it is done. Plain JavaScript, as a thread's source must stand alone.
 */
const source = `
const { workerData } = require('node:worker_threads');
const { module, memory, control, names } = workerData;
const words = new Int32Array(control, 0, 4);
const args = new Float64Array(control, 16);
const { exports } = new WebAssembly.Instance(module, { env: { memory } });
let turn = 0;
for (;;) {
  Atomics.wait(words, 0, turn);
  turn = Atomics.load(words, 0);
  const name = names[words[2]];
  if (name === undefined) break;
  exports[name](...args.subarray(0, words[3]));
  Atomics.store(words, 1, turn);
  Atomics.notify(words, 1);
}
`;

const MOST_ARGUMENTS = 16;
/** Looks at the other's word this often before sleeping: halves end within microseconds of each other. */
const LOOKS = 2_000;
/** One kernel on half of the rows takes milliseconds; a thread silent for this long is gone. */
const PATIENCE = 60_000;

/** A thread that runs one kernel at a time on the second half of the rows. */
export class SecondThread {
  private readonly words: Int32Array;
  private readonly args: Float64Array;
  private turn = 0;

  private constructor(
    private readonly worker: Worker,
    control: SharedArrayBuffer,
    private readonly patience: number,
  ) {
    this.words = new Int32Array(control, 0, 4);
    this.args = new Float64Array(control, 16);
  }

  static start(memory: WebAssembly.Memory, patience = PATIENCE): SecondThread {
    const control = new SharedArrayBuffer(16 + 8 * MOST_ARGUMENTS);
    const worker = new Worker(source, {
      eval: true,
      execArgv: [],
      workerData: { module: kernelModule(), memory, control, names: kernelNames },
    });
    // It must not keep a process alive that has nothing else to do.
    worker.unref();
    return new SecondThread(worker, control, patience);
  }

  begin(name: keyof Kernels, args: readonly number[]): void {
    this.args.set(args);
    this.words[2] = kernelNames.indexOf(name);
    this.words[3] = args.length;
    Atomics.store(this.words, 0, ++this.turn);
    Atomics.notify(this.words, 0);
  }

  /** @throws Error when the thread died; what its half should have held is then unknown. */
  wait(): void {
    for (let looks = 0; looks < LOOKS; looks++) if (Atomics.load(this.words, 1) === this.turn) return;
    for (;;) {
      const seen = Atomics.load(this.words, 1);
      if (seen === this.turn) return;
      if (Atomics.wait(this.words, 1, seen, this.patience) === 'timed-out')
        throw new Error('The second computing thread no longer answers.');
    }
  }

  async end(): Promise<void> {
    await this.worker.terminate();
  }
}
