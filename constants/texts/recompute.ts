/** Words of pricing a stored value once more in the reader's own browser. */
export const recomputeText = {
  title: 'Recompute here',
  body: 'Prices the stored inputs once more in this browser, by every route, and compares with what is on record.',
  act: 'Recompute',
  busy: 'Recomputing',
  allSame: (count: number) => {
    const routes = ['the one route', 'both routes'].at(count - 1) ?? `all ${count} routes`;
    return `Equal to the bit: ${routes} gave the recorded value.`;
  },
  someDiffer: 'Not equal to the bit; the differences stand below.',
  recomputed: 'recomputed',
  difference: 'difference',
  same: 'same bits',
} as const;
