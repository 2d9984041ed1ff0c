import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { booksText } from '@/constants/texts/books';
import { uiText } from '@/constants/texts/ui';
import type { TradeSort } from '@/shared/contracts/trades';

/** Columns that may be hidden; the first one names its row. */
const optionalColumns = [
  ['underlying', booksText.terms],
  ['expiry', booksText.expiry],
  ['value', booksText.value],
  ['agreement', booksText.agreement],
  ['change', booksText.change],
  ['total', booksText.total],
] as const satisfies readonly (readonly [TradeSort | 'agreement', string])[];

export type ColumnChoiceProps = { hidden: readonly string[]; toggle: (id: string) => void };

/** Which columns of the table are shown. */
export function ColumnChoice({ hidden, toggle }: ColumnChoiceProps) {
  const [open, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <>
      <Button kind="quiet" label={booksText.columns} onPress={() => setOpen(true)} />
      <Dialog
        title={booksText.columnsTitle}
        open={open}
        onClose={close}
        actions={<Button label={uiText.close} onPress={close} />}
      >
        <div className="pills">
          {optionalColumns.map(([id, label]) => (
            <label key={id} className="pill">
              <input
                className="visually-hidden"
                type="checkbox"
                checked={!hidden.includes(id)}
                onChange={() => toggle(id)}
              />
              {label}
            </label>
          ))}
        </div>
      </Dialog>
    </>
  );
}
