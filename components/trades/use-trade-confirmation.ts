import { useState } from 'react';
import { tradeActText } from '@/constants/texts/trades';
import { useReloadTrade, useTradeAct, type TradeAct } from '@/hooks/use-trades';
import { ApiError } from '@/shared/api-client';
import type { Trade } from '@/shared/contracts/trades';

export type TradeConfirmation = {
  busy: boolean;
  /** Someone was quicker; the trade was read again and can be decided anew. */
  stale: { title: string; body: string } | undefined;
  failure: string | null;
  /** Sends the act; complaints about single fields are handed to the form. */
  confirm: (act: TradeAct, showIssue: (path: string, message: string) => boolean) => Promise<void>;
};

export function useTradeConfirmation(
  deskId: string,
  trade: Trade,
  onDone: () => void,
): TradeConfirmation {
  const { mutateAsync, isPending } = useTradeAct(deskId, trade.id);
  const reload = useReloadTrade(deskId, trade.id);
  const [stale, setStale] = useState<TradeConfirmation['stale']>();
  const [failure, setFailure] = useState<string | null>(null);
  const confirm: TradeConfirmation['confirm'] = async (act, showIssue) => {
    setFailure(null);
    setStale(undefined);
    try {
      await mutateAsync(act);
      onDone();
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      const left = error.issues.filter(({ path, message }) => !showIssue(path, message));
      if (error.code === 'stale-version' || error.code === 'move-not-allowed') {
        await reload();
        const title = left[0]?.message ?? tradeActText.stale;
        setStale({ title, body: tradeActText.staleBody });
      } else if (left.length > 0) setFailure(left[0].message);
      else if (error.issues.length === 0) setFailure(error.message);
    }
  };
  return { busy: isPending, stale, failure, confirm };
}
