/** Works on all tasks, a few at a time. */
export async function inTurns<T>(
  tasks: readonly T[],
  atATime: number,
  work: (task: T) => Promise<void>,
): Promise<void> {
  const waiting = [...tasks];
  const worker = async () => {
    for (let task = waiting.shift(); task !== undefined; task = waiting.shift()) await work(task);
  };
  await Promise.all(Array.from({ length: atATime }, worker));
}
