import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { TradeActDialog } from '@/components/forms/lazy-forms';
import { ActionBar } from '@/components/ui/action-bar';
import { BackLink } from '@/components/ui/back-link';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { statusWord, tradeActText, tradeText } from '@/constants/texts/trades';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Trade } from '@/shared/contracts/trades';
import { formatInstant } from '@/shared/format/dates';
import { isLive, moveRefusal, tradeMoves, type TradeMove } from '@/shared/trade-moves';
import { errorOf } from '@/hooks/error-of';
import { useMinute } from '@/hooks/use-minute';
import type { TradeAct } from '@/hooks/use-trades';
import { useTrade } from '@/hooks/use-trades';
import { TimeLine } from './time-line';
import {
  DifferencesSection,
  EndSection,
  LastValueSection,
  TermsSection,
  VersionsSection,
} from './trade-sections';
import { statusTone, tradeTerms } from './trade-summary';

export type TradeScreenProps = { desk: DeskAccess; userId: string; tradeId: string };

export function TradeScreen({ desk, userId, tradeId }: TradeScreenProps) {
  const { data: trade, error, refetch } = useTrade(desk.id, tradeId);
  if (trade) return <TradePage desk={desk} userId={userId} trade={trade} />;
  return (
    <Screen title={tradeText.title}>
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={5} height={72} />
      )}
    </Screen>
  );
}

/** What this person may do with the trade now, and whether only four eyes stand in the way. */
function useMoves(trade: Trade, desk: DeskAccess, userId: string) {
  const makers = {
    proposedById: trade.proposedBy.id,
    lastAmendedById: trade.versions[0].proposedBy.id,
  };
  const who = { userId, permissions: desk.permissions };
  const refusalOf = (move: TradeMove) => moveRefusal(move, { status: trade.status, makers }, who);
  return {
    allowed: tradeMoves.filter((move) => refusalOf(move) === null),
    ownTrade: refusalOf('approve') === 'own-trade',
  };
}

/** What happens next, in a sentence. */
function nextOf({ status, proposedBy, versions }: Trade): string {
  const lastMaker = versions[0].proposedBy.name;
  const makers = proposedBy.name === lastMaker ? lastMaker : `${proposedBy.name} and ${lastMaker}`;
  const next = tradeText.next[status];
  return typeof next === 'string' ? next : next(makers);
}

type TradePageProps = { desk: DeskAccess; userId: string; trade: Trade };

function TradePage({ desk, userId, trade }: TradePageProps) {
  const wide = useWide();
  const nowMs = useMinute();
  const { allowed, ownTrade } = useMoves(trade, desk, userId);
  const [open, setOpen] = useState<TradeAct['kind'] | null>(null);
  const [done, setDone] = useState<string | null>(null);
  const due = isLive(trade.status) && Date.parse(trade.expiryAt) <= nowMs;
  const atHand = actsAtHand.filter((move) => allowed.includes(move) && (move !== 'expire' || due));
  const acts = <Acts trade={trade} desk={desk} moves={atHand} start={setOpen} />;
  return (
    <Screen
      title={tradeText.trade(trade.number)}
      measure={1240}
      overline={
        <BackLink href={`/desks/${desk.id}/books/${trade.book.id}`} label={trade.book.code} />
      }
      actions={wide && atHand.length > 0 ? acts : undefined}
    >
      {done ? <Notice tone="moss" title={done} /> : null}
      <View style={styles.standing}>
        <Badge tone={statusTone[trade.status]} label={statusWord[trade.status]} />
        <Text>{tradeTerms(trade)}</Text>
      </View>
      <Standing trade={trade} desk={desk} ownTrade={ownTrade} />
      <View style={styles.pair}>
        <View style={styles.half}>
          <DifferencesSection trade={trade} desk={desk} />
          <LastValueSection trade={trade} desk={desk} />
          <EndSection trade={trade} />
          <TermsSection trade={trade} desk={desk} />
        </View>
        <View style={styles.half}>
          <TimeLine
            trade={trade}
            next={due ? tradeText.next.due : nextOf(trade)}
            timeZone={desk.timeZone}
          />
          <VersionsSection trade={trade} desk={desk} />
          <EndItSection trade={trade} moves={due ? [] : allowed} start={setOpen} />
        </View>
      </View>
      {!wide && atHand.length > 0 ? <ActionBar>{acts}</ActionBar> : null}
      {open ? (
        <TradeActDialog
          kind={open}
          trade={trade}
          desk={desk}
          userId={userId}
          onClose={() => setOpen(null)}
          onDone={() => {
            setDone(tradeActText.done[open](trade.number));
            setOpen(null);
          }}
        />
      ) : null}
    </Screen>
  );
}

/** What stands in someone's way, or what was said when the trade came back. */
function Standing({
  trade,
  desk,
  ownTrade,
}: Omit<TradePageProps, 'userId'> & { ownTrade: boolean }) {
  const [latest] = trade.versions;
  if (ownTrade) return <Notice tone="lake" title={tradeText.ownTrade} />;
  if (latest.state !== 'returned' || !latest.decidedBy || !latest.decidedAt) return null;
  return (
    <Notice
      tone="ochre"
      title={tradeText.returnedWith(
        latest.decidedBy.name,
        formatInstant(latest.decidedAt, desk.timeZone),
      )}
      body={latest.decisionReason ?? ''}
    />
  );
}

/** The acts of every day, the main one last; ending a trade before its time stands apart. */
const actsAtHand = ['expire', 'amend', 'return', 'approve'] as const;

type Start = (kind: TradeAct['kind']) => void;
type ActsProps = {
  trade: Trade;
  desk: DeskAccess;
  moves: readonly (typeof actsAtHand)[number][];
  start: Start;
};

function Acts({ trade, desk, moves, start }: ActsProps) {
  return moves.map((move) =>
    move === 'amend' ? (
      <Button
        key={move}
        grow
        kind="secondary"
        label={tradeActText.amend}
        href={`/desks/${desk.id}/trades/${trade.id}/amend`}
      />
    ) : (
      <Button
        key={move}
        grow
        kind={move === 'return' ? 'secondary' : 'primary'}
        label={tradeActText[move]}
        onPress={() => start(move)}
      />
    ),
  );
}

type EndItProps = { trade: Trade; moves: readonly TradeMove[]; start: Start };

/** Ends a trade before its time: by closing it, or because the holder of an American one exercised. */
function EndItSection({ trade, moves, start }: EndItProps) {
  const ends = (['close', 'expire'] as const).filter(
    (move) => moves.includes(move) && (move === 'close' || trade.exercise === 'american'),
  );
  if (ends.length === 0) return null;
  return (
    <Section title={tradeText.endItTitle}>
      <Text tone="muted">{tradeText.endItBody}</Text>
      <View style={styles.ends}>
        {ends.map((move) => (
          <Button
            key={move}
            kind="secondary"
            label={tradeActText[move]}
            onPress={() => start(move)}
          />
        ))}
      </View>
    </Section>
  );
}

const styles = StyleSheet.create({
  standing: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
  ends: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0, gap: space.lg },
});
