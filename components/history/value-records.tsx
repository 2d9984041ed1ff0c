import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { recordKindWords, valueText } from '@/constants/texts/history';
import type { SealedRecord } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';

/** Who proposed, approved, signed off or overrode what this value rests on. */
export function ValueRecords({
  records,
  desk,
}: {
  records: readonly SealedRecord[];
  desk: DeskAccess;
}) {
  return (
    <Section title={valueText.recordsTitle}>
      {records.length === 0 ? (
        <Text tone="muted">{valueText.noRecords}</Text>
      ) : (
        <DataTable
          plain
          caption={valueText.recordsTitle}
          columns={columnsOf(desk)}
          rows={records}
          rowId={({ position }) => String(position)}
        />
      )}
    </Section>
  );
}

const columnsOf = (desk: DeskAccess): Column<SealedRecord>[] => [
  {
    id: 'when',
    header: valueText.when,
    nowrap: true,
    cell: ({ at }) => formatInstant(at, desk.timeZone),
  },
  {
    id: 'what',
    header: valueText.what,
    cell: ({ body }) => `${recordKindWords[body.kind]}: ${body.event}`,
  },
  { id: 'who', header: valueText.who, nowrap: true, cell: ({ by }) => by.name },
  { id: 'why', header: valueText.why, cell: ({ body }) => body.reason ?? '' },
];
