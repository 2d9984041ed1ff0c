import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { VerdictMark } from '@/components/charts/verdict-mark';
import { positionWords } from '@/components/price/answer-card';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { FactList, type Fact } from '@/components/ui/fact-list';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { tradeText, versionStateWord } from '@/constants/texts/trades';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { LastValuation, Trade, TradeVersion } from '@/shared/contracts/trades';
import { formatInstant } from '@/shared/format/dates';
import { formatMoney } from '@/shared/format/money';
import { formatDifference, formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { isLive, isWaiting } from '@/shared/trade-moves';
import { differencesOf, type Difference } from './differences';
import { lastAgreement, tradeOption } from './trade-summary';

type SectionProps = { trade: Trade; desk: DeskAccess };

/** What the last run found, with its error and its verdict. */
export function LastValueSection({ trade, desk }: SectionProps) {
  const { lastValuation: last, status } = trade;
  if (!last)
    return (
      <Section title={tradeText.valueTitle}>
        <Text tone="muted">{isLive(status) ? tradeText.noValue : tradeText.notLiveYet}</Text>
      </Section>
    );
  return (
    <Section title={tradeText.valueTitle}>
      <ValueFigures trade={trade} last={last} />
      <AgreementStrip {...lastAgreement(trade, last)} size="card" />
      <FactList facts={valueFacts(trade, last)} />
      <View style={styles.links}>
        <Link href={`/desks/${desk.id}/runs/${last.runId}`}>{tradeText.openRun}</Link>
        <Link href={`/desks/${desk.id}/history?trade=${trade.number}`}>{tradeText.history}</Link>
        {desk.permissions.includes('run-studies') ? (
          <Link href={`/desks/${desk.id}/studies/new?trade=${trade.id}`}>{tradeText.study}</Link>
        ) : null}
      </View>
    </Section>
  );
}

function ValueFigures({ trade, last }: { trade: Trade; last: LastValuation }) {
  const { underlying } = trade;
  const { decimals } = lastAgreement(trade, last);
  return (
    <View style={styles.figures}>
      <Text tabular size="figure" weight="semibold">
        {formatNumber(last.value, decimals)}
      </Text>
      <Text tone="muted">{booksText.perUnit(underlying.currency, underlying.unit)}</Text>
      <Text tabular tone="muted">
        ± {formatErrorEstimate(last.errorEstimate)}
      </Text>
      <VerdictMark verdict={last.verdict} long />
    </View>
  );
}

function valueFacts(trade: Trade, last: LastValuation): Fact[] {
  const { decimals, currency } = lastAgreement(trade, last);
  return [
    { name: tradeText.total, value: formatMoney(last.total, currency, 'always') },
    {
      name: tradeText.change,
      value: last.change === null ? tradeText.firstValue : formatDifference(last.change, decimals),
    },
    { name: tradeText.valued, value: tradeText.valuedOn(last.snapshotDate) },
  ];
}

const atDesk = (instant: string, { timeZone }: DeskAccess) =>
  tradeText.atZone(formatInstant(instant, timeZone), timeZone);

/** The version whose terms a trade is shown with. */
const shownVersion = ({ versions, liveVersionId, latestVersionId }: Trade) =>
  versions.find(({ id }) => id === (liveVersionId ?? latestVersionId)) ?? versions[0];

export function TermsSection({ trade, desk }: SectionProps) {
  const version = shownVersion(trade);
  const premium = formatMoney(version.premiumAmount, version.premiumCurrency);
  const facts: Fact[] = [
    { name: tradeText.underlying, value: `${trade.underlying.name} (${trade.underlying.symbol})` },
    { name: tradeText.option, value: tradeOption(trade) },
    { name: tradeText.position, value: positionWords(trade, trade.underlying.unit) },
    { name: tradeText.expiry, value: atDesk(version.expiryAt, desk) },
    { name: tradeText.counterparty, value: version.counterparty },
    { name: tradeText.premium, value: tradeText.premiumPaid(premium, version.premiumDate) },
    { name: tradeText.tradedAt, value: atDesk(version.tradedAt, desk) },
    { name: tradeText.book, value: booksText.bookTitle(trade.book.code, trade.book.name) },
    ...(version.note === '' ? [] : [{ name: tradeText.note, value: version.note }]),
    { name: tradeText.identifier, value: trade.id, mono: true },
  ];
  return (
    <Section
      title={trade.liveVersionId === null ? tradeText.proposedTermsTitle : tradeText.termsTitle}
    >
      <FactList facts={facts} />
      {version.quoteId ? (
        <Link href={`/desks/${desk.id}/quotes/${version.quoteId}`}>{tradeText.openQuote}</Link>
      ) : null}
    </Section>
  );
}

export function EndSection({ trade: { end } }: { trade: Trade }) {
  if (!end) return null;
  const amount =
    end.amount === null || end.currency === null
      ? []
      : [{ name: tradeText.endAmount, value: formatMoney(end.amount, end.currency, 'always') }];
  const facts = [
    { name: tradeText.outcome, value: tradeText.outcomeWord[end.outcome] },
    { name: tradeText.endDate, value: end.date },
    ...amount,
  ];
  return (
    <Section title={tradeText.endTitle}>
      <FactList facts={facts} />
    </Section>
  );
}

const differenceColumns: Column<Difference>[] = [
  { id: 'field', header: tradeText.field, cell: ({ field }) => field },
  { id: 'before', header: tradeText.before, cell: ({ before }) => before },
  {
    id: 'after',
    header: tradeText.after,
    cell: ({ after }) => <Text weight="semibold">{after}</Text>,
  },
];

/** What a waiting version would change, so that whoever approves it sees just that. */
export function DifferencesSection({ trade, desk }: SectionProps) {
  const [latest, before] = comparedVersions(trade);
  if (!before || !isWaiting(trade.status)) return null;
  const reason = latest.amendmentReason;
  return (
    <Section title={tradeText.differencesTitle}>
      <DataTable
        plain
        caption={tradeText.differencesTitle}
        columns={differenceColumns}
        rows={differencesOf(before, latest, desk.timeZone)}
        rowId={({ field }) => field}
      />
      {reason ? <Text>{tradeText.amendedBecause(latest.proposedBy.name, reason)}</Text> : null}
    </Section>
  );
}

/** The waiting version, and the one in force; before there is one, the version before it. */
function comparedVersions({ versions, liveVersionId }: Trade): [TradeVersion, TradeVersion?] {
  const [latest, previous] = versions;
  return [latest, versions.find(({ id }) => id === liveVersionId) ?? previous];
}

const versionColumns = (timeZone: string): Column<TradeVersion>[] => [
  { id: 'number', header: tradeText.version, cell: ({ number }) => number },
  { id: 'state', header: tradeText.state, cell: ({ state }) => versionStateWord[state] },
  {
    id: 'proposed',
    header: tradeText.proposedBy,
    cell: ({ proposedBy, proposedAt }) =>
      tradeText.byAt(proposedBy.name, formatInstant(proposedAt, timeZone)),
  },
  {
    id: 'decided',
    header: tradeText.decidedBy,
    cell: ({ decidedBy, decidedAt }) =>
      decidedBy && decidedAt
        ? tradeText.byAt(decidedBy.name, formatInstant(decidedAt, timeZone))
        : '',
  },
  {
    id: 'why',
    header: tradeText.why,
    cell: ({ decisionReason, amendmentReason }) => decisionReason ?? amendmentReason ?? '',
  },
];

export function VersionsSection({ trade, desk }: SectionProps) {
  if (trade.versions.length < 2) return null;
  return (
    <Section title={tradeText.versionsTitle}>
      <DataTable
        plain
        caption={tradeText.versionsTitle}
        columns={versionColumns(desk.timeZone)}
        rows={trade.versions}
        rowId={({ id }) => id}
        card={(version) => <VersionLines version={version} timeZone={desk.timeZone} />}
      />
    </Section>
  );
}

/** A version on a phone. */
function VersionLines({ version, timeZone }: { version: TradeVersion; timeZone: string }) {
  const { number, state, proposedBy, proposedAt, decidedBy, decidedAt } = version;
  const reason = version.decisionReason ?? version.amendmentReason;
  return (
    <View>
      <Text weight="semibold">{tradeText.versionIs(number, versionStateWord[state])}</Text>
      <Text size="small" tone="muted" tabular>
        {tradeText.proposedAt(proposedBy.name, formatInstant(proposedAt, timeZone))}
      </Text>
      {decidedBy && decidedAt ? (
        <Text size="small" tone="muted" tabular>
          {tradeText.decidedAt(decidedBy.name, formatInstant(decidedAt, timeZone))}
        </Text>
      ) : null}
      {reason ? <Text>{reason}</Text> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  figures: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
  links: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
});
