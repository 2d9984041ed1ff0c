import { columnVisibilityFeature, createColumnHelper, tableFeatures } from '@tanstack/react-table';
import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Badge } from '@/components/ui/badge';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { exceptionText, valuesText } from '@/constants/texts/runs';
import type { RunValuation } from '@/shared/contracts/runs';
import { formatMoney } from '@/shared/format/money';
import { formatDifference } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';
import { agreementOf, decimalsOf, errorText, kindTone, valueText } from './run-words';

/** The server orders and filters; the table keeps which columns are shown. */
export const valueFeatures = tableFeatures({ columnVisibilityFeature });

const helper = createColumnHelper<typeof valueFeatures, RunValuation>();

/** Columns whose cells are numbers, which align at the right. */
export const numericColumns: readonly string[] = ['value', 'change', 'total'];

const column = (
  id: keyof typeof valuesText.columns | 'trade',
  header: string,
  cell: (valuation: RunValuation) => React.ReactNode,
) => helper.display({ id, header, cell: ({ row }) => cell(row.original) });

const { columns: headings } = valuesText;

export const valueColumns = (deskId: string) =>
  helper.columns([
    column('trade', valuesText.trade, (valuation) => <Named valuation={valuation} />),
    column('terms', headings.terms, (valuation) => <Terms valuation={valuation} />),
    column('book', headings.book, ({ book }) => <span className="unbroken">{book.code}</span>),
    column('value', headings.value, (valuation) => <Value valuation={valuation} deskId={deskId} />),
    column('agreement', headings.agreement, (valuation) =>
      valuation.strip.length > 0 ? <AgreementStrip {...agreementOf(valuation)} size="row" /> : null,
    ),
    column('change', headings.change, (valuation) =>
      valuation.change === null ? '' : formatDifference(valuation.change, decimalsOf(valuation)),
    ),
    column('total', headings.total, ({ total, underlying }) =>
      total === null ? '' : formatMoney(total, underlying.currency, 'always'),
    ),
  ]);

function Named({ valuation: { trade, exception } }: { valuation: RunValuation }) {
  return (
    <View>
      <span className="unbroken">{trade.number}</span>
      {exception ? (
        <View style={styles.badge}>
          <Badge
            label={exceptionText.kinds[exception.kind]}
            tone={exception.state === 'open' ? kindTone[exception.kind] : 'muted'}
          />
        </View>
      ) : null}
    </View>
  );
}

function Terms({ valuation: { underlying, terms } }: { valuation: RunValuation }) {
  return (
    <View>
      <Text>{underlying.name}</Text>
      <Text size="small" tone="muted" tabular>
        {optionTerms(terms, underlying.priceDecimals)}
      </Text>
    </View>
  );
}

/** The value leads to everything that it rests on. */
function Value({ valuation, deskId }: { valuation: RunValuation; deskId: string }) {
  const value = valueText(valuation);
  const error = errorText(valuation);
  return (
    <View>
      <Text tabular style={styles.end}>
        <Link
          href={`/desks/${deskId}/history/${valuation.position}`}
          label={valuesText.openValue(valuation.trade.number, value ?? valuesText.noValue)}
        >
          {value ?? valuesText.noValue}
        </Link>
      </Text>
      {error === null ? null : (
        <Text size="small" tone="muted" tabular style={styles.end}>
          ± {error}
        </Text>
      )}
    </View>
  );
}

const styles = StyleSheet.create({
  badge: { flexDirection: 'row' },
  end: { textAlign: 'right' },
});
