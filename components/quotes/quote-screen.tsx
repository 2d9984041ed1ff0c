import { StyleSheet, View } from 'react-native';
import { AnswerCard } from '@/components/price/answer-card';
import { CautionsSection } from '@/components/price/cautions';
import type { Evidence } from '@/components/price/evidence';
import { GreeksSection } from '@/components/price/greeks-section';
import { RecomputeSection } from '@/components/price/recompute-section';
import { RoutesSection } from '@/components/price/routes-section';
import { ActionBar } from '@/components/ui/action-bar';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { quotesText } from '@/constants/texts/quotes';
import { space } from '@/constants/theme';
import type { Quote } from '@/shared/contracts/quotes';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useQuote } from '@/hooks/use-quotes';
import type { StoredPrice } from '@/hooks/use-recompute';
import { QuoteRecord, QuoteTermsSection } from './quote-facts';
import { summaryTerms } from './quote-summary';

export function QuoteScreen({ desk, quoteId }: { desk: DeskAccess; quoteId: string }) {
  const { data: quote, error, refetch } = useQuote(desk.id, quoteId);
  const back = <BackLink href={`/desks/${desk.id}/quotes`} label={quotesText.back} />;
  if (quote) return <QuotePage desk={desk} quote={quote} />;
  return (
    <Screen title={quotesText.title} overline={back}>
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={5} height={72} />
      )}
    </Screen>
  );
}

const evidenceOf = (quote: Quote): Evidence => ({
  routes: quote.routes,
  primary: quote.primaryRoute,
  verdict: quote.verdict,
  refuted: quote.refuted,
  tolerance: quote.tolerance,
  underlying: quote.underlying,
  exercise: quote.exercise,
  position: quote,
});

/** The contract exactly as it was priced: its time to expiry is on record as a double. */
const storedPriceOf = ({ exercise, kind, strike, expiryYears, market, routes }: Quote) =>
  ({
    contract: { payoff: 'vanilla', exercise, kind, strike: Number(strike), expiry: expiryYears },
    market,
    routes: routes.flatMap(({ result }) => (result.ok ? [result] : [])),
  }) satisfies StoredPrice;

/** What this person may make of a quote: a ticket with its terms, or a trade. */
function actsOf(quote: Quote, desk: DeskAccess) {
  const acts = [
    {
      permission: 'price',
      kind: 'secondary',
      label: quotesText.useTerms,
      href: `/desks/${desk.id}/ticket?from=${quote.id}`,
    },
    {
      permission: 'propose-trades',
      kind: 'primary',
      label: quotesText.proposeTrade,
      href: `/desks/${desk.id}/quotes/${quote.id}/propose`,
    },
  ] as const;
  return acts
    .filter(({ permission }) => desk.permissions.includes(permission))
    .map(({ kind, label, href }) => (
      <Button key={href} grow kind={kind} label={label} href={href} />
    ));
}

/** One quote and everything that it rests on, from top to bottom. */
function QuotePage({ desk, quote }: { desk: DeskAccess; quote: Quote }) {
  const evidence = evidenceOf(quote);
  const wide = useWide();
  const acts = actsOf(quote, desk);
  return (
    <Screen
      title={quotesText.quote(quote.number)}
      measure={1240}
      overline={<BackLink href={`/desks/${desk.id}/quotes`} label={quotesText.back} />}
      actions={wide ? acts : undefined}
    >
      <Text tone="muted">{summaryTerms(quote)}</Text>
      <AnswerCard evidence={evidence} />
      <View style={styles.pair}>
        <View style={styles.half}>
          <RoutesSection evidence={evidence} />
          {desk.permissions.includes('run-studies') ? (
            <Link href={`/desks/${desk.id}/studies/new?quote=${quote.id}`}>{quotesText.study}</Link>
          ) : null}
        </View>
        <View style={styles.half}>
          <GreeksSection evidence={evidence} />
        </View>
      </View>
      <View style={styles.pair}>
        <View style={styles.half}>
          <QuoteTermsSection quote={quote} desk={desk} />
        </View>
        <View style={styles.half}>
          <QuoteRecord quote={quote} desk={desk} />
          <RecomputeSection price={storedPriceOf(quote)} />
        </View>
      </View>
      <CautionsSection evidence={evidence} />
      {wide || acts.length === 0 ? null : <ActionBar>{acts}</ActionBar>}
    </Screen>
  );
}

const styles = StyleSheet.create({
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0, gap: space.lg },
});
