/** Asks again and again until the answer is the wanted one. */
export async function waitFor<T>(
  ask: () => Promise<T>,
  isWanted: (answer: T) => boolean,
  timeoutMs = 30_000,
): Promise<T> {
  const deadline = Date.now() + timeoutMs;
  for (;;) {
    const answer = await ask();
    if (isWanted(answer)) return answer;
    if (Date.now() > deadline)
      throw new Error(`it never became so; the last answer was ${JSON.stringify(answer)}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
