/** What a file of the history says of each value: one row a value, its check beside it. */
import type { ValuationBody } from '@/shared/contracts/chain-bodies';

export type Cell = string | number | boolean | Date | null;

/** One value as the file's writer gets it. */
export type ExportRow = {
  position: number;
  hash: string;
  underlying: { symbol: string; currency: string };
  body: ValuationBody;
  check: ValuationBody | null;
};

export type ExportColumn = {
  name: string;
  unit: string;
  meaning: string;
  cell: (row: ExportRow) => Cell;
};

/** Sizes of a method in one cell: `spaceSteps=400 timeSteps=200`. */
const settingsText = ({ request }: ValuationBody): string =>
  Object.entries(request.method)
    .filter(([name]) => name !== 'name')
    .map(([name, value]) => `${name}=${value}`)
    .join(' ');

const valueOf = (body: ValuationBody | null): Cell => (body?.result.ok ? body.result.value : null);

const errorOf = (body: ValuationBody | null): Cell =>
  body?.result.ok ? body.result.errorEstimate : null;

const failureOf = (body: ValuationBody | null): Cell =>
  body && !body.result.ok ? body.result.code : null;

const greek =
  (name: 'delta' | 'gamma' | 'vega' | 'theta' | 'rho') =>
  ({ body }: ExportRow): Cell =>
    body.result.ok ? body.result.greeks[name] : null;

const perUnit = 'quote currency per unit';

const termColumns: readonly ExportColumn[] = [
  {
    name: 'valued_at',
    unit: 'UTC',
    meaning: 'Valuation instant',
    cell: ({ body }) => new Date(body.valuedAt),
  },
  { name: 'run', unit: '', meaning: 'Number of the run', cell: ({ body }) => body.runNumber },
  { name: 'book', unit: '', meaning: 'Code of the book', cell: ({ body }) => body.bookCode },
  { name: 'trade', unit: '', meaning: 'Number of the trade', cell: ({ body }) => body.tradeNumber },
  {
    name: 'underlying',
    unit: '',
    meaning: 'Symbol of the underlying',
    cell: ({ underlying }) => underlying.symbol,
  },
  {
    name: 'currency',
    unit: 'ISO 4217',
    meaning: 'Quote currency',
    cell: ({ underlying }) => underlying.currency,
  },
  {
    name: 'kind',
    unit: '',
    meaning: 'Call or put',
    cell: ({ body }) => body.request.contract.kind,
  },
  {
    name: 'exercise',
    unit: '',
    meaning: 'When the holder may exercise',
    cell: ({ body }) => body.request.contract.exercise,
  },
  {
    name: 'strike',
    unit: 'quote currency',
    meaning: 'Strike',
    cell: ({ body }) => body.request.contract.strike,
  },
  {
    name: 'expiry_years',
    unit: 'year',
    meaning: 'Time to expiry, ACT/365 Fixed',
    cell: ({ body }) => body.request.contract.expiry,
  },
];

const marketColumns: readonly ExportColumn[] = [
  {
    name: 'spot',
    unit: 'quote currency',
    meaning: 'Spot price, or the futures price of a future',
    cell: ({ body }) => body.request.market.spot,
  },
  {
    name: 'rate',
    unit: '1/year',
    meaning: 'Continuously compounded rate',
    cell: ({ body }) => body.request.market.rate,
  },
  {
    name: 'yield',
    unit: '1/year',
    meaning: 'Continuous dividend yield or foreign rate; empty for a future',
    cell: ({ body: { request } }) => ('yield' in request.market ? request.market.yield : null),
  },
  {
    name: 'volatility',
    unit: '1/sqrt(year)',
    meaning: 'Volatility',
    cell: ({ body }) => body.request.market.volatility,
  },
];

const valueColumns: readonly ExportColumn[] = [
  {
    name: 'value',
    unit: perUnit,
    meaning: 'Value by the primary route',
    cell: ({ body }) => valueOf(body),
  },
  {
    name: 'error_estimate',
    unit: perUnit,
    meaning: 'The route’s own estimate of its error',
    cell: ({ body }) => errorOf(body),
  },
  {
    name: 'failure',
    unit: '',
    meaning: 'Why the primary route gave no value',
    cell: ({ body }) => failureOf(body),
  },
  {
    name: 'verdict',
    unit: '',
    meaning: 'What the routes say together',
    cell: ({ body }) => body.verdict ?? null,
  },
  {
    name: 'refuted',
    unit: '',
    meaning: 'Whether an error estimate was refuted',
    cell: ({ body }) => body.refuted ?? null,
  },
  {
    name: 'tolerance',
    unit: perUnit,
    meaning: 'Tolerance that the verdict used',
    cell: ({ body }) => body.tolerance,
  },
  { name: 'delta', unit: 'per 1.00 of spot', meaning: 'Sensitivity', cell: greek('delta') },
  { name: 'gamma', unit: 'per 1.00 of spot, twice', meaning: 'Sensitivity', cell: greek('gamma') },
  { name: 'vega', unit: 'per 1.00 of volatility', meaning: 'Sensitivity', cell: greek('vega') },
  { name: 'theta', unit: 'per year', meaning: 'Sensitivity', cell: greek('theta') },
  { name: 'rho', unit: 'per 1.00 of rate', meaning: 'Sensitivity', cell: greek('rho') },
];

const proofColumns: readonly ExportColumn[] = [
  { name: 'route', unit: '', meaning: 'Primary route', cell: ({ body }) => body.route },
  {
    name: 'settings',
    unit: '',
    meaning: 'Settings of the primary route',
    cell: ({ body }) => settingsText(body),
  },
  {
    name: 'check_route',
    unit: '',
    meaning: 'Check route',
    cell: ({ check }) => check?.route ?? null,
  },
  {
    name: 'check_value',
    unit: perUnit,
    meaning: 'Value by the check route',
    cell: ({ check }) => valueOf(check),
  },
  {
    name: 'check_error_estimate',
    unit: perUnit,
    meaning: 'The check route’s own estimate of its error',
    cell: ({ check }) => errorOf(check),
  },
  {
    name: 'check_failure',
    unit: '',
    meaning: 'Why the check route gave no value',
    cell: ({ check }) => failureOf(check),
  },
  { name: 'engine', unit: '', meaning: 'Version of the engine', cell: ({ body }) => body.engine },
  { name: 'snapshot_id', unit: '', meaning: 'Market data', cell: ({ body }) => body.snapshotId },
  { name: 'policy_id', unit: '', meaning: 'Pricing policy', cell: ({ body }) => body.policyId },
  {
    name: 'chain_position',
    unit: 'entries',
    meaning: 'Place in the chain of valuations',
    cell: ({ position }) => position,
  },
  { name: 'chain_hash', unit: 'SHA-256', meaning: 'Hash of the entry', cell: ({ hash }) => hash },
];

export const exportColumns: readonly ExportColumn[] = [
  ...termColumns,
  ...marketColumns,
  ...valueColumns,
  ...proofColumns,
];
