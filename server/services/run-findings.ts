/** What a run's findings amount to: verdicts counted, and which of them need someone's answer. */
import type { ExceptionKind, RunCounts } from '@/shared/contracts/runs';
import { positionUnits } from '@/shared/quote-terms';
import type { TaskFinding } from '../threads/value';
import type { RunTrade } from './run-trades';

/** Booked amounts keep this many decimals. */
const amountDecimals = 10;

const hasFailed = ({ primary, check }: TaskFinding) => !primary.result.ok || !check.result.ok;

/** One kind a trade, the gravest that fits; null where nothing is wrong. */
function kindOf(found: TaskFinding): ExceptionKind | null {
  if (hasFailed(found)) return 'failure';
  if (found.verdict === 'disagree') return 'disagree';
  if (found.refuted) return 'refuted';
  if (found.verdict === 'one-route') return 'unchecked';
  return found.verdict === 'wide' ? 'wide' : null;
}

export type FoundException = { kind: ExceptionKind; materiality: string | null };

/** With the distance between the routes in money, for the position as a whole. */
export function exceptionOf(trade: RunTrade, found: TaskFinding): FoundException | null {
  const kind = kindOf(found);
  if (kind === null) return null;
  const { distance } = found;
  const materiality =
    distance === null
      ? null
      : positionUnits(trade).abs().times(distance).toDecimalPlaces(amountDecimals).toFixed();
  return { kind, materiality };
}

export function countsOf(findings: readonly TaskFinding[]): RunCounts {
  const compared = findings.filter((found) => !hasFailed(found));
  const count = (verdict: TaskFinding['verdict']) =>
    compared.filter((found) => found.verdict === verdict).length;
  return {
    agree: count('agree'),
    wide: count('wide'),
    disagree: count('disagree'),
    oneRoute: count('one-route'),
    failed: findings.length - compared.length,
    refuted: findings.filter(({ refuted }) => refuted).length,
  };
}
