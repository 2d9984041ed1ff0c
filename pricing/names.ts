/** The closed lists of names that a request may use. */

export const optionKinds = ['call', 'put'] as const;

/** Every payoff that the request shape knows by name; `checkRequest` says which are priced. */
export const payoffs = [
  'vanilla',
  'cash-or-nothing',
  'asset-or-nothing',
  'barrier',
  'double-knock-out',
  'one-touch',
  'no-touch',
  'double-no-touch',
  'asian',
] as const;

export const pricedPayoffs = ['vanilla', 'cash-or-nothing', 'asset-or-nothing'] as const;

export const exercises = ['european', 'american', 'bermudan', 'perpetual'] as const;

export const pricedExercises = ['european', 'american'] as const;

export const methodNames = [
  'closed-form',
  'heat-crank-nicolson',
  'lattice-crr',
  'lattice-symmetric',
  'heat-explicit',
  'heat-implicit',
  'spectral-boundary',
  'lattice-jarrow-rudd',
  'lattice-tian',
  'lattice-trinomial',
  'lattice-leisen-reimer',
] as const;

/** Rows of a study that belong together: walks of odd and even length err in their own ways. */
export const ladderSeries = ['all', 'odd', 'even'] as const;

/** What the rows of a study say about the order that a method promises. */
export const orderVerdicts = ['as-expected', 'lower', 'higher', 'not-determined'] as const;

export const smoothings = ['none', 'richardson'] as const;
