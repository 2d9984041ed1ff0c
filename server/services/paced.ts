/** Calls at most once in a while: progress is for people, who read a few times a second. */
export function paced<Value>(everyMs: number, act: (value: Value) => Promise<unknown>) {
  let lastMs = Number.NEGATIVE_INFINITY;
  return async (value: Value): Promise<void> => {
    if (performance.now() - lastMs < everyMs) return;
    lastMs = performance.now();
    await act(value);
  };
}
