import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { booksText } from '@/constants/texts/books';
import { uiText } from '@/constants/texts/ui';

export type ColumnChoiceProps = {
  /** Those that may be hidden, with their headings; the first of a table names its row and stays. */
  columns: readonly (readonly [id: string, heading: string])[];
  hidden: readonly string[];
  toggle: (id: string) => void;
};

/** Which columns of the table are shown. */
export function ColumnChoice({ columns, hidden, toggle }: ColumnChoiceProps) {
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
          {columns.map(([id, label]) => (
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
