import type { ClipboardEvent, KeyboardEvent } from 'react';
import { useId } from 'react';
import { useController, useFormContext, useWatch } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import type { Market } from '@/pricing/contract';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { marketEditorText, marketTableText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import { marketColumns, readMarketRow, type MarketColumn } from '@/shared/market-cells';
import {
  cellName,
  readPasted,
  type GridUnderlying,
  type GridValues,
  type Pasted,
} from './market-form';
import { moveText } from './market-table';

export type MarketGridProps = {
  underlyings: readonly GridUnderlying[];
  before: ReadonlyMap<string, Market>;
  onPasted: (pasted: Pasted) => void;
};

const hasCell = ({ kind }: GridUnderlying, column: MarketColumn) =>
  column !== 'yield' || kind !== 'future';

const headerOf = (column: MarketColumn) =>
  column === 'price'
    ? marketEditorText.columns.price
    : `${marketEditorText.columns[column]} ${marketEditorText.percent}`;

/** Up, down and enter move within a column, as in a spreadsheet. */
function moveInColumn(event: KeyboardEvent<HTMLDivElement>) {
  const { target } = event;
  const steps = { ArrowUp: -1, ArrowDown: 1, Enter: 1 }[event.key];
  if (steps === undefined || !(target instanceof HTMLInputElement)) return;
  const column = target.name.split('_')[1];
  const cells = Array.from(event.currentTarget.querySelectorAll('input')).filter(
    ({ name }) => name.split('_')[1] === column,
  );
  event.preventDefault();
  cells[cells.indexOf(target) + steps]?.focus();
}

/** One row for each underlying: typed, or pasted from a spreadsheet. */
export function MarketGrid({ underlyings, before, onPasted }: MarketGridProps) {
  const onPaste = (event: ClipboardEvent<HTMLDivElement>) => {
    if (!(event.target instanceof HTMLInputElement)) return;
    const text = event.clipboardData.getData('text');
    const pasted = readPasted(text, underlyings, event.target.name);
    if (!pasted) return;
    event.preventDefault();
    onPasted(pasted);
  };
  return (
    <Section title={marketEditorText.gridTitle}>
      <Text size="small" tone="muted">
        {marketEditorText.pasteHint}
      </Text>
      <div onPaste={onPaste} onKeyDown={moveInColumn}>
        <DataTable
          plain
          caption={marketEditorText.gridCaption}
          columns={columnsWith(before)}
          rows={underlyings}
          rowId={({ id }) => id}
          card={(row) => <GridCard underlying={row} before={before.get(row.id) ?? null} />}
        />
      </div>
    </Section>
  );
}

const columnsWith = (before: ReadonlyMap<string, Market>): Column<GridUnderlying>[] => [
  {
    id: 'underlying',
    header: marketTableText.underlying,
    cell: (underlying) => <Name underlying={underlying} />,
  },
  ...marketColumns.map((column): Column<GridUnderlying> => ({
    id: column,
    header: headerOf(column),
    align: 'end',
    cell: (underlying) =>
      hasCell(underlying, column) ? (
        <GridCell underlying={underlying} column={column} />
      ) : (
        <Text size="small" tone="muted">
          {marketEditorText.noYield}
        </Text>
      ),
  })),
  {
    id: 'move',
    header: marketTableText.move,
    align: 'end',
    cell: (underlying) => (
      <Move underlying={underlying} before={before.get(underlying.id) ?? null} />
    ),
  },
];

function Name({ underlying: { symbol, name } }: { underlying: GridUnderlying }) {
  return (
    <View>
      <Text weight="semibold">{symbol}</Text>
      <Text size="small" tone="muted">
        {name}
      </Text>
    </View>
  );
}

type CellProps = { underlying: GridUnderlying; column: MarketColumn };

/** A cell of the table on a wide window. */
function GridCell({ underlying: { id, symbol }, column }: CellProps) {
  const { field, fieldState } = useController<GridValues>({ name: cellName(id, column) });
  const errorId = useId();
  const message = fieldState.error?.message;
  return (
    <>
      <input
        {...field}
        className="cell-input"
        inputMode="decimal"
        autoComplete="off"
        aria-label={marketEditorText.cell(headerOf(column), symbol)}
        aria-invalid={message !== undefined}
        aria-describedby={message === undefined ? undefined : errorId}
        onFocus={(event) => event.target.select()}
      />
      {message === undefined ? null : (
        <p className="field-error cell-error" id={errorId} role="alert">
          {message}
        </p>
      )}
    </>
  );
}

/** How far the price is from the close before, as far as it can be read. */
function Move({ underlying, before }: { underlying: GridUnderlying; before: Market | null }) {
  const { control } = useFormContext<GridValues>();
  const names = marketColumns.map((column) => cellName(underlying.id, column));
  const [price, rate, carry, volatility] = useWatch({ control, name: names });
  const read = readMarketRow(underlying.kind, { price, rate, yield: carry, volatility });
  return <Text tabular>{read.ok ? moveText(read.market, before) : marketTableText.none}</Text>;
}

/** One underlying on a phone. */
function GridCard({ underlying, before }: { underlying: GridUnderlying; before: Market | null }) {
  return (
    <View style={styles.card}>
      <View style={styles.head}>
        <Name underlying={underlying} />
        <Move underlying={underlying} before={before} />
      </View>
      <View style={styles.cells}>
        {marketColumns
          .filter((column) => hasCell(underlying, column))
          .map((column) => (
            <View key={column} style={styles.cell}>
              <CardCell underlying={underlying} column={column} />
            </View>
          ))}
      </View>
    </View>
  );
}

function CardCell({ underlying: { id }, column }: CellProps) {
  const { field, fieldState } = useController<GridValues>({ name: cellName(id, column) });
  const { onChange, ...rest } = field;
  return (
    <TextField
      {...rest}
      label={marketEditorText.columns[column]}
      unit={column === 'price' ? undefined : marketEditorText.percent}
      inputMode="decimal"
      selectAllOnFocus
      onChangeText={onChange}
      error={fieldState.error?.message}
    />
  );
}

const styles = StyleSheet.create({
  card: { gap: space.sm, paddingVertical: space.sm },
  head: { flexDirection: 'row', justifyContent: 'space-between', gap: space.sm },
  cells: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 130 },
});
