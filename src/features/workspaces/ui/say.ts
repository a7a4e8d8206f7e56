import { toast } from '@/components/ui';
import { ApiError } from '@/lib/api';

/** What went wrong, in the server's words where it gave some. */
export const problemOf = (error: unknown): string =>
  error instanceof ApiError ? error.problem.detail : 'That did not work. Nothing was changed.';

/** Runs a change; says that it worked, or why it did not. Answers with whether it worked. */
export async function attempt(work: () => Promise<void>, done: string): Promise<boolean> {
  try {
    await work();
    toast(done);
    return true;
  } catch (error) {
    toast(problemOf(error), { tone: 'error' });
    return false;
  }
}
