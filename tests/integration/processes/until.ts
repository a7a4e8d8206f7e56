/** Asks again and again until there is an answer; fails after `seconds`. */
export async function until<T>(ask: () => Promise<T | null | false>, seconds = 60): Promise<T> {
  const end = Date.now() + seconds * 1000;
  for (;;) {
    const answer = await ask();
    if (answer) return answer;
    if (Date.now() > end) throw new Error('waited too long');
    await new Promise((resolve) => setTimeout(resolve, 40));
  }
}
