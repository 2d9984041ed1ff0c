import { useEffect, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { Button } from '@/components/ui/button';
import { DataTable } from '@/components/ui/data-table';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { TextField } from '@/components/ui/text-field';
import { agreementText } from '@/constants/texts/agreement';
import { quotesText } from '@/constants/texts/quotes';
import { space } from '@/constants/theme';
import { verdicts } from '@/pricing/contract';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useQuotes, type QuoteFilter } from '@/hooks/use-quotes';
import { QuoteCard } from './quote-card';
import { quoteColumns } from './quote-columns';

export type QuoteListScreenProps = {
  desk: DeskAccess;
  filter: QuoteFilter;
  onFilter: (filter: QuoteFilter) => void;
};

export function QuoteListScreen({ desk, filter, onFilter }: QuoteListScreenProps) {
  return (
    <Screen title={quotesText.title} measure={1240}>
      <Filters filter={filter} onFilter={onFilter} />
      <QuoteRows desk={desk} filter={filter} onFilter={onFilter} />
    </Screen>
  );
}

/** Long enough that a word typed in one go asks the server once. */
const searchAfterMs = 250;

const anyVerdict = 'any';

function Filters({ filter, onFilter }: Omit<QuoteListScreenProps, 'desk'>) {
  const { search, verdict } = filter;
  const [text, setText] = useState(search);
  useEffect(() => {
    const wanted = text.trim();
    if (wanted === search) return;
    const timer = setTimeout(() => onFilter({ search: wanted, verdict }), searchAfterMs);
    return () => clearTimeout(timer);
  }, [text, search, verdict, onFilter]);
  return (
    <View style={styles.filters}>
      <View style={styles.search}>
        <TextField
          label={quotesText.search}
          placeholder={quotesText.searchHint}
          type="search"
          value={text}
          maxLength={100}
          onChangeText={setText}
        />
      </View>
      <View style={styles.verdict}>
        <SelectField
          label={quotesText.verdict}
          value={verdict ?? anyVerdict}
          options={[
            { value: anyVerdict, label: quotesText.anyVerdict },
            ...verdicts.map((one) => ({ value: one, label: agreementText.verdictWord[one] })),
          ]}
          onChange={(one) =>
            onFilter({ search: text.trim(), verdict: one === anyVerdict ? null : one })
          }
        />
      </View>
    </View>
  );
}

function QuoteRows({ desk, filter, onFilter }: QuoteListScreenProps) {
  const quotes = useQuotes(desk.id, filter);
  const { data: rows, error, isError } = quotes;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void quotes.refetch()} />;
  if (!rows) return <SkeletonRows rows={8} height={48} />;
  if (rows.length === 0) return <NoQuotes desk={desk} filter={filter} onFilter={onFilter} />;
  return (
    <>
      <DataTable
        sticky
        caption={quotesText.caption}
        columns={quoteColumns(desk)}
        rows={rows}
        rowId={({ id }) => id}
        rowHref={({ id }) => `/desks/${desk.id}/quotes/${id}`}
        card={(row) => <QuoteCard quote={row} desk={desk} />}
      />
      <ListFoot pages={quotes} />
    </>
  );
}

function NoQuotes({ desk, filter, onFilter }: QuoteListScreenProps) {
  if (filter.search !== '' || filter.verdict !== null)
    return (
      <EmptyState
        title={quotesText.nothingFoundTitle}
        body={quotesText.nothingFoundBody}
        action={
          <Button
            kind="secondary"
            label={quotesText.clearFilters}
            onPress={() => onFilter({ search: '', verdict: null })}
          />
        }
      />
    );
  const mayPrice = desk.permissions.includes('price');
  return (
    <EmptyState
      title={quotesText.emptyTitle}
      body={quotesText.emptyBody}
      action={
        mayPrice ? (
          <Button label={quotesText.openTicket} href={`/desks/${desk.id}/ticket`} />
        ) : undefined
      }
    />
  );
}

const styles = StyleSheet.create({
  filters: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  search: { flexGrow: 1, flexShrink: 1, flexBasis: 180, maxWidth: 420 },
  verdict: { flexGrow: 1, flexShrink: 1, flexBasis: 130, maxWidth: 220 },
});
