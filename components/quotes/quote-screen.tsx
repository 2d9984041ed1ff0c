import { StyleSheet, View } from 'react-native';
import { AnswerCard } from '@/components/price/answer-card';
import { CautionsSection } from '@/components/price/cautions';
import type { Evidence } from '@/components/price/evidence';
import { GreeksSection } from '@/components/price/greeks-section';
import { RoutesSection } from '@/components/price/routes-section';
import { ActionBar } from '@/components/ui/action-bar';
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
import { QuoteRecord, QuoteTermsSection } from './quote-facts';
import { summaryTerms } from './quote-summary';
import { RecomputeSection } from './recompute-section';

export function QuoteScreen({ desk, quoteId }: { desk: DeskAccess; quoteId: string }) {
  const { data: quote, error, refetch } = useQuote(desk.id, quoteId);
  const back = <Link href={`/desks/${desk.id}/quotes`}>{quotesText.back}</Link>;
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

/** One quote and everything that it rests on, from top to bottom. */
function QuotePage({ desk, quote }: { desk: DeskAccess; quote: Quote }) {
  const evidence = evidenceOf(quote);
  const wide = useWide();
  const termsButton = desk.permissions.includes('price') ? (
    <Button
      grow
      kind="secondary"
      label={quotesText.useTerms}
      href={`/desks/${desk.id}/ticket?from=${quote.id}`}
    />
  ) : null;
  return (
    <Screen
      title={quotesText.quote(quote.number)}
      measure={1240}
      overline={<Link href={`/desks/${desk.id}/quotes`}>{quotesText.back}</Link>}
      actions={wide ? termsButton : undefined}
    >
      <Text tone="muted">{summaryTerms(quote)}</Text>
      <AnswerCard evidence={evidence} />
      <View style={styles.pair}>
        <View style={styles.half}>
          <RoutesSection evidence={evidence} />
          <RecomputeSection quote={quote} />
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
        </View>
      </View>
      <CautionsSection evidence={evidence} />
      {wide || !termsButton ? null : <ActionBar>{termsButton}</ActionBar>}
    </Screen>
  );
}

const styles = StyleSheet.create({
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0, gap: space.lg },
});
