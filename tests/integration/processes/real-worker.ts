import { spawn, type ChildProcess } from 'node:child_process';

/** The job process as it is run in production, against this test's database; started again when it ends by itself. */
export class RealWorker {
  private child: ChildProcess | null = null;
  private wanted = true;
  /** How often it was started. */
  starts = 0;

  private constructor(private readonly again: boolean) {}

  /** @param again whether to start it anew when it ends without being killed, as `npm start` does */
  static start(again = false): RealWorker {
    const worker = new RealWorker(again);
    worker.spawn();
    return worker;
  }

  private spawn(): void {
    this.starts++;
    this.child = spawn(process.execPath, ['--import', 'tsx', 'src/worker.ts'], {
      env: process.env,
      stdio: ['ignore', 'ignore', 'inherit'],
    });
    this.child.once('exit', () => {
      if (this.wanted && this.again) setTimeout(() => this.spawn(), 500);
    });
  }

  /** As a power cut would end it. */
  kill(): void {
    this.wanted = false;
    this.child?.kill('SIGKILL');
  }
}
