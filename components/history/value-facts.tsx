import { StyleSheet, View } from 'react-native';
import { Section } from '@/components/ui/card';
import { FactList, type Fact } from '@/components/ui/fact-list';
import { Link } from '@/components/ui/link';
import { valueText } from '@/constants/texts/history';
import { routeLabel } from '@/constants/texts/price';
import { space } from '@/constants/theme';
import type { HistoryValue } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatPercent, formatQuantity } from '@/shared/format/numbers';
import { decimalsOfValue, optionWords } from './history-words';

type FactsProps = { value: HistoryValue; desk: DeskAccess };

/** Every setting as it was asked for, so that the same can be asked for again. */
const settingsOf = (method: object): string =>
  Object.entries(method)
    .filter(([name]) => name !== 'name')
    .map(([name, size]) => `${name} ${size}`)
    .join(', ') || '–';

/** What the engine was given. */
export function ValueInputs({ value, desk }: FactsProps) {
  const { underlying, valuations } = value;
  const [{ body }] = valuations;
  const { contract, market } = body.request;
  const isFuture = 'carry' in market;
  const facts: Fact[] = [
    { name: valueText.underlying, value: `${underlying.name} (${underlying.symbol})` },
    { name: valueText.option, value: optionWords({ underlying, body }, desk.timeZone) },
    { name: valueText.years, value: valueText.yearsOf(formatQuantity(contract.expiry, 0, 17)) },
    { name: valueText.valuedAt, value: formatInstant(body.valuedAt, desk.timeZone) },
    {
      name: isFuture ? valueText.futuresPrice : valueText.spot,
      value: formatQuantity(market.spot, underlying.priceDecimals, 17),
    },
    { name: valueText.volatility, value: formatPercent(market.volatility) },
    { name: valueText.rate, value: formatPercent(market.rate) },
    ...(isFuture ? [] : [{ name: valueText.yield, value: formatPercent(market.yield) }]),
    { name: valueText.tolerance, value: formatQuantity(body.tolerance, 0, 17) },
    ...valuations.map((entry) => ({
      name: valueText.settings(routeLabel(entry.body.route)),
      value: settingsOf(entry.body.request.method),
    })),
    { name: valueText.engine, value: body.engine, mono: true },
    { name: valueText.snapshot, value: body.snapshotId, mono: true },
    { name: valueText.policy, value: body.policyId, mono: true },
  ];
  return (
    <Section title={valueText.inputsTitle}>
      <FactList facts={facts} />
      <View style={styles.links}>
        <Link href={`/desks/${desk.id}/market-data/${body.snapshotId}`}>
          {valueText.openSnapshot}
        </Link>
        <Link href={`/desks/${desk.id}/policies`}>{valueText.openPolicies}</Link>
      </View>
    </Section>
  );
}

function beforeWords({ value, desk }: FactsProps): string {
  const { before, underlying, valuations } = value;
  if (!before) return valueText.noneBefore;
  const when = formatInstant(before.valuedAt, desk.timeZone);
  if (before.value === null) return when;
  const decimals = decimalsOfValue({ underlying, body: valuations[0].body });
  return `${formatQuantity(before.value, decimals, decimals)}, ${when}`;
}

/** Where the value stands in the chain, and what it belongs to. */
export function ValueSeal({ value, desk }: FactsProps) {
  const [entry] = value.valuations;
  const { body } = entry;
  const facts: Fact[] = [
    { name: valueText.book, value: body.bookCode },
    { name: valueText.run, value: body.runNumber },
    { name: valueText.tradeVersion, value: body.tradeVersionId, mono: true },
    { name: valueText.before, value: beforeWords({ value, desk }) },
    { name: valueText.position, value: String(entry.position) },
    { name: valueText.sealedAt, value: entry.at, mono: true },
    { name: valueText.hash, value: entry.hash, mono: true },
    { name: valueText.previous, value: entry.previous, mono: true },
  ];
  return (
    <Section title={valueText.sealTitle}>
      <FactList facts={facts} />
      <View style={styles.links}>
        <Link href={`/desks/${desk.id}/runs/${body.runId}`}>{valueText.openRun}</Link>
        <Link href={`/desks/${desk.id}/trades/${body.tradeId}`}>{valueText.openTrade}</Link>
        {value.before ? (
          <Link href={`/desks/${desk.id}/history/${value.before.position}`}>
            {valueText.openBefore}
          </Link>
        ) : null}
      </View>
    </Section>
  );
}

const styles = StyleSheet.create({
  links: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.lg, rowGap: space.xs },
});
