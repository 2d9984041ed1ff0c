import { useEffect, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { SelectField, type Option } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { useWide } from '@/components/ui/use-wide';
import { agreementText } from '@/constants/texts/agreement';
import { booksText, sortLabel } from '@/constants/texts/books';
import { statusWord } from '@/constants/texts/trades';
import { space } from '@/constants/theme';
import { verdicts } from '@/pricing/contract';
import { sortDirections, statusFilters, tradeSorts } from '@/shared/contracts/trades';
import { useUnderlyings } from '@/hooks/use-underlyings';
import type { TradeFilter } from '@/hooks/use-trades';

export type TradeFiltersProps = {
  deskId: string;
  filter: TradeFilter;
  onFilter: (change: Partial<TradeFilter>) => void;
};

/** Long enough that a word typed in one go asks the server once. */
const searchAfterMs = 250;

const any = 'any';

const statusOptions: Option<string>[] = [
  { value: any, label: booksText.anyStatus },
  ...statusFilters.map((value) => ({
    value,
    label: value === 'waiting' ? booksText.waitingStatus : statusWord[value],
  })),
];

const verdictOptions: Option<string>[] = [
  { value: any, label: booksText.anyVerdict },
  ...verdicts.map((value) => ({ value, label: agreementText.verdictWord[value] })),
];

const orderOptions: Option<string>[] = tradeSorts.flatMap((sort) =>
  sortDirections.map((direction) => ({
    value: `${sort} ${direction}`,
    label: sortLabel(sort, direction),
  })),
);

export function TradeFilters({ deskId, filter, onFilter }: TradeFiltersProps) {
  const wide = useWide();
  return (
    <View style={styles.filters}>
      <View style={styles.search}>
        <SearchField search={filter.search} onSearch={(search) => onFilter({ search })} />
      </View>
      <View style={styles.choice}>
        <SelectField
          label={booksText.status}
          value={filter.status ?? any}
          options={statusOptions}
          onChange={(text) =>
            onFilter({ status: statusFilters.find((one) => one === text) ?? null })
          }
        />
      </View>
      <View style={styles.choice}>
        <SelectField
          label={booksText.verdict}
          value={filter.verdict ?? any}
          options={verdictOptions}
          onChange={(text) => onFilter({ verdict: verdicts.find((one) => one === text) ?? null })}
        />
      </View>
      <View style={styles.choice}>
        <UnderlyingChoice deskId={deskId} filter={filter} onFilter={onFilter} />
      </View>
      {wide ? null : (
        <View style={styles.choice}>
          <OrderChoice filter={filter} onFilter={onFilter} />
        </View>
      )}
    </View>
  );
}

function SearchField({ search, onSearch }: { search: string; onSearch: (text: string) => void }) {
  const [text, setText] = useState(search);
  useEffect(() => {
    const wanted = text.trim();
    if (wanted === search) return;
    const timer = setTimeout(() => onSearch(wanted), searchAfterMs);
    return () => clearTimeout(timer);
  }, [text, search, onSearch]);
  return (
    <TextField
      label={booksText.search}
      placeholder={booksText.searchHint}
      type="search"
      value={text}
      maxLength={100}
      onChangeText={setText}
    />
  );
}

function UnderlyingChoice({ deskId, filter, onFilter }: TradeFiltersProps) {
  const { data } = useUnderlyings(deskId);
  const options = (data ?? []).map(({ id, symbol }) => ({ value: id, label: symbol }));
  return (
    <SelectField
      label={booksText.underlying}
      value={filter.underlyingId ?? any}
      options={[{ value: any, label: booksText.anyUnderlying }, ...options]}
      onChange={(id) => onFilter({ underlyingId: id === any ? null : id })}
    />
  );
}

/** What a wide window says at the headings of its table. */
function OrderChoice({ filter, onFilter }: Omit<TradeFiltersProps, 'deskId'>) {
  const choose = (text: string) => {
    const [first, second] = text.split(' ');
    const sort = tradeSorts.find((one) => one === first);
    const direction = sortDirections.find((one) => one === second);
    if (sort && direction) onFilter({ sort, direction });
  };
  return (
    <SelectField
      label={booksText.sortBy}
      value={`${filter.sort} ${filter.direction}`}
      options={orderOptions}
      onChange={choose}
    />
  );
}

const styles = StyleSheet.create({
  filters: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  search: { flexGrow: 2, flexShrink: 1, flexBasis: 260, maxWidth: 420 },
  choice: { flexGrow: 1, flexShrink: 1, flexBasis: 140, maxWidth: 220 },
});
