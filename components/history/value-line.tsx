import { useState } from 'react';
import { LineChart } from '@/components/charts/lazy-charts';
import type { LinePoint } from '@/components/charts/line-chart';
import { Section } from '@/components/ui/card';
import { LinkButton } from '@/components/ui/text-field';
import { agreementText } from '@/constants/texts/agreement';
import { historyText } from '@/constants/texts/history';
import type { HistoryRow } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { decimalsOfValue, isException } from './history-words';

/** The values of one trade as a line; the table below it holds the same values. */
export function ValueLine({ rows, desk }: { rows: readonly HistoryRow[]; desk: DeskAccess }) {
  const [shown, setShown] = useState(true);
  const [newest] = rows;
  const { currency, unit } = newest.underlying;
  return (
    <Section
      title={historyText.linesOf(newest.body.tradeNumber)}
      action={
        <LinkButton
          label={shown ? historyText.showAsTable : historyText.showAsLine}
          expanded={shown}
          onPress={() => setShown(!shown)}
        />
      }
    >
      {shown ? (
        <LineChart
          title={historyText.lineAxis(currency, unit)}
          points={rows.map((row) => pointOf(row, desk)).reverse()}
          markedWord={historyText.exception}
        />
      ) : null}
    </Section>
  );
}

function pointOf(row: HistoryRow, desk: DeskAccess): LinePoint {
  const { result, verdict, valuedAt } = row.body;
  const when = formatInstant(valuedAt, desk.timeZone);
  const words = result.ok
    ? `${formatNumber(result.value, decimalsOfValue(row))} ± ${formatErrorEstimate(result.errorEstimate)}`
    : historyText.noValue;
  const said = verdict === undefined ? '' : `, ${agreementText.verdictWord[verdict]}`;
  return {
    at: Date.parse(valuedAt),
    value: result.ok ? result.value : null,
    marked: isException(row.body),
    reading: `${when}: ${words}${said}`,
  };
}
