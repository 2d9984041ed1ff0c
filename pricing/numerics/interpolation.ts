/** A value with its first and second derivative in the variable of the nodes. */
export type LocalValue = { value: number; first: number; second: number };

/**
 * The polynomial through `count` nodes from index `from`, and its first two derivatives, at `at`:
 * Newton's divided differences, summed by Horner's rule (the derivatives by the same recurrence).
 * Error of the value: the product of the distances to the nodes times f⁽ᶜᵒᵘⁿᵗ⁾/count!.
 */
export function interpolate(
  nodes: Float64Array,
  values: Float64Array,
  from: number,
  count: number,
  at: number,
): LocalValue {
  const difference = values.slice(from, from + count);
  for (let order = 1; order < count; order++) {
    for (let i = count - 1; i >= order; i--) {
      difference[i] =
        (difference[i] - difference[i - 1]) / (nodes[from + i] - nodes[from + i - order]);
    }
  }
  let value = difference[count - 1];
  let first = 0;
  let second = 0;
  for (let i = count - 2; i >= 0; i--) {
    const distance = at - nodes[from + i];
    second = second * distance + 2 * first;
    first = first * distance + value;
    value = value * distance + difference[i];
  }
  return { value, first, second };
}

/** The largest index whose node is not above `at`; 0 where none is. Nodes ascend. */
export function nodeBelow(nodes: Float64Array, at: number): number {
  let low = 0;
  let high = nodes.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (nodes[middle] <= at) low = middle;
    else high = middle;
  }
  return low;
}
