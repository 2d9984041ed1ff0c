import { useEffect, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { agreementText } from '@/constants/texts/agreement';
import { historyText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import { verdicts } from '@/pricing/contract';
import type { HistoryFilter } from '@/shared/contracts/history';
import { isCalendarDate } from '@/shared/dates';
import { useUnderlyings } from '@/hooks/use-underlyings';

export type HistoryFiltersProps = {
  deskId: string;
  filter: HistoryFilter;
  onFilter: (filter: HistoryFilter) => void;
  /** What the book is called, where a value of it is in sight. */
  bookCode: string | null;
};

const any = 'any';

export function HistoryFilters({ deskId, filter, onFilter, bookCode }: HistoryFiltersProps) {
  const { data: underlyings = [] } = useUnderlyings(deskId);
  const set = (change: Partial<HistoryFilter>) => onFilter({ ...filter, ...change });
  return (
    <View style={styles.filters}>
      <TypedFilter
        label={historyText.tradeField}
        hint={historyText.tradeHint}
        value={filter.trade}
        onChange={(trade) => set({ trade })}
      />
      <TypedFilter
        label={historyText.runField}
        hint={historyText.runHint}
        value={filter.run}
        onChange={(run) => set({ run })}
      />
      <View style={styles.field}>
        <SelectField
          label={historyText.underlyingField}
          value={filter.underlyingId ?? any}
          options={[
            { value: any, label: historyText.anyUnderlying },
            ...underlyings.map(({ id, symbol, name }) => ({
              value: id,
              label: `${symbol}, ${name}`,
            })),
          ]}
          onChange={(id) => set({ underlyingId: id === any ? undefined : id })}
        />
      </View>
      <View style={styles.field}>
        <SelectField
          label={historyText.verdictField}
          value={filter.verdict ?? any}
          options={[
            { value: any, label: historyText.anyVerdict },
            ...verdicts.map((one) => ({ value: one, label: agreementText.verdictWord[one] })),
          ]}
          onChange={(one) => set({ verdict: verdicts.find((verdict) => verdict === one) })}
        />
      </View>
      <DayFilter label={historyText.from} value={filter.from} onChange={(from) => set({ from })} />
      <DayFilter label={historyText.to} value={filter.to} onChange={(to) => set({ to })} />
      {Object.values(filter).some((value) => value !== undefined) ? (
        <View style={styles.acts}>
          {filter.bookId === undefined ? null : (
            <Button
              kind="quiet"
              icon="close"
              label={historyText.onlyBook(bookCode ?? filter.bookId.slice(0, 8))}
              onPress={() => set({ bookId: undefined })}
            />
          )}
          <Button kind="quiet" label={historyText.clear} onPress={() => onFilter({})} />
        </View>
      ) : null}
    </View>
  );
}

/** Long enough that a number typed in one go asks the server once. */
const askAfterMs = 300;

type FilterFieldProps = {
  label: string;
  value: string | undefined;
  onChange: (value: string | undefined) => void;
};

function TypedFilter({ label, hint, value, onChange }: FilterFieldProps & { hint: string }) {
  const [typed, setTyped] = useState({ text: value ?? '', of: value });
  // An address that changed from elsewhere takes the place of what stands in the field.
  const text = typed.of === value ? typed.text : (value ?? '');
  useEffect(() => {
    const wanted = text.trim() || undefined;
    if (wanted === value) return;
    const timer = setTimeout(() => onChange(wanted), askAfterMs);
    return () => clearTimeout(timer);
  }, [text, value, onChange]);
  return (
    <View style={styles.field}>
      <TextField
        label={label}
        placeholder={hint}
        type="search"
        value={text}
        maxLength={40}
        onChangeText={(next) => setTyped({ text: next, of: value })}
      />
    </View>
  );
}

/** A day is asked for once it is one; what is typed in between stays in the field. */
function DayFilter({ label, value, onChange }: FilterFieldProps) {
  const [typed, setTyped] = useState({ text: value ?? '', of: value });
  const [left, setLeft] = useState(false);
  const text = typed.of === value ? typed.text : (value ?? '');
  const change = (next: string) => {
    const day = next.trim();
    const known = day === '' ? undefined : isCalendarDate(day) ? day : value;
    setLeft(false);
    setTyped({ text: next, of: known });
    if (known !== value) onChange(known);
  };
  const wrong = text.trim() !== '' && !isCalendarDate(text.trim());
  return (
    <View style={styles.day}>
      <TextField
        label={label}
        placeholder={historyText.dayHint}
        inputMode="numeric"
        maxLength={10}
        value={text}
        error={left && wrong ? historyText.noDay : undefined}
        onChangeText={change}
        onBlur={() => setLeft(true)}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  filters: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  field: { flexGrow: 1, flexShrink: 1, flexBasis: 170, maxWidth: 260 },
  day: { flexGrow: 1, flexShrink: 1, flexBasis: 150, maxWidth: 180 },
  acts: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.xs },
});
