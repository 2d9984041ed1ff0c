import { StyleSheet, View } from 'react-native';
import { AnswerCard } from '@/components/price/answer-card';
import { CautionsSection } from '@/components/price/cautions';
import type { Evidence } from '@/components/price/evidence';
import { GreeksSection } from '@/components/price/greeks-section';
import { RecomputeSection } from '@/components/price/recompute-section';
import { RoutesSection } from '@/components/price/routes-section';
import { BackLink } from '@/components/ui/back-link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { historyText, valueText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import type { HistoryValue } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { useHistoryValue } from '@/hooks/use-history';
import type { StoredPrice } from '@/hooks/use-recompute';
import { optionWords } from './history-words';
import { ValueInputs, ValueSeal } from './value-facts';
import { ValueRecords } from './value-records';

export function ValueScreen({ desk, position }: { desk: DeskAccess; position: string }) {
  const { data: value, error, refetch } = useHistoryValue(desk.id, position);
  if (value) return <ValuePage desk={desk} value={value} />;
  return (
    <Screen
      title={historyText.title}
      overline={<BackLink href={`/desks/${desk.id}/history`} label={valueText.back} />}
    >
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={5} height={72} />
      )}
    </Screen>
  );
}

/** The position is left out: it belongs to the trade, the value to one unit. */
function evidenceOf({ valuations, underlying }: HistoryValue): Evidence {
  const [{ body }] = valuations;
  return {
    routes: valuations.map((entry) => ({ name: entry.body.route, result: entry.body.result })),
    primary: body.route,
    verdict: body.verdict ?? 'one-route',
    refuted: body.refuted ?? false,
    tolerance: body.tolerance,
    underlying,
    exercise: body.request.contract.exercise,
    position: null,
  };
}

function storedPriceOf({ valuations }: HistoryValue): StoredPrice {
  const [{ body }] = valuations;
  return {
    contract: body.request.contract,
    market: body.request.market,
    routes: valuations.flatMap(({ body: { request, result } }) =>
      result.ok ? [{ method: request.method, value: result.value }] : [],
    ),
  };
}

/** One stored value and everything that it rests on, from top to bottom. */
function ValuePage({ desk, value }: { desk: DeskAccess; value: HistoryValue }) {
  const [{ body }] = value.valuations;
  const evidence = evidenceOf(value);
  const ofTrade = `/desks/${desk.id}/history?trade=${encodeURIComponent(body.tradeNumber)}`;
  return (
    <Screen
      title={valueText.title(
        body.tradeNumber,
        formatInstant(body.valuedAt, desk.timeZone).slice(0, 10),
      )}
      measure={1240}
      overline={<BackLink href={ofTrade} label={valueText.ofTrade(body.tradeNumber)} />}
      subtitle={`${value.underlying.name} ${optionWords({ ...value, body }, desk.timeZone)}`}
    >
      {body.result.ok ? (
        <AnswerCard evidence={evidence} />
      ) : (
        <Notice tone="brick" title={valueText.failed} body={body.result.message} />
      )}
      <View style={styles.pair}>
        <View style={styles.half}>
          <RoutesSection evidence={evidence} />
          <RecomputeSection price={storedPriceOf(value)} />
        </View>
        <View style={styles.half}>
          <GreeksSection evidence={evidence} />
        </View>
      </View>
      <View style={styles.pair}>
        <View style={styles.half}>
          <ValueInputs value={value} desk={desk} />
        </View>
        <View style={styles.half}>
          <ValueSeal value={value} desk={desk} />
        </View>
      </View>
      <ValueRecords records={value.records} desk={desk} />
      <CautionsSection evidence={evidence} />
    </Screen>
  );
}

const styles = StyleSheet.create({
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0, gap: space.lg },
});
