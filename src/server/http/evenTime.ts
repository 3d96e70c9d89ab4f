/**
 * Waits until at least `floorMs` have passed since the start of `work`, whether it failed or not: how long
 * an answer takes then does not tell which way it went.
 */
export async function evenTime<T>(floorMs: number, work: () => Promise<T>): Promise<T> {
  const [settled] = await Promise.all([
    work().then(
      (value) => () => value,
      (error: unknown) => () => {
        throw error;
      },
    ),
    new Promise((resolve) => setTimeout(resolve, floorMs)),
  ]);
  return settled();
}
