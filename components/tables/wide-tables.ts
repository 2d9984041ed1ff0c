/** The tables of a wide window, in one part with what drives them: a phone never fetches it. */
export { ValueTable } from '@/components/runs/value-table';
export { TradeTable } from '@/components/trades/trade-table';
