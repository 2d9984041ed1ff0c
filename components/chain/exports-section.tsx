import { useState } from 'react';
import { ExportFiles } from '@/components/history/export-section';
import { ListFoot } from '@/components/tables/list-foot';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { SkeletonRows } from '@/components/ui/states';
import { LinkButton } from '@/components/ui/text-field';
import { Text } from '@/components/ui/text';
import { chainText } from '@/constants/texts/history';
import type { HistoryExport } from '@/shared/contracts/exports';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { useExports } from '@/hooks/use-exports';

/** Every file that was made of the history, to be kept once more with its manifest. */
export function ExportsSection({ desk }: { desk: DeskAccess }) {
  const list = useExports(desk.id);
  const { data: rows, error } = list;
  const [openId, setOpenId] = useState<string | null>(null);
  const open = rows?.find(({ id }) => id === openId);
  return (
    <Section title={chainText.exportsTitle}>
      {rows === undefined && !error ? <SkeletonRows rows={2} /> : null}
      {rows?.length === 0 ? <Text tone="muted">{chainText.noExports}</Text> : null}
      {rows && rows.length > 0 ? (
        <DataTable
          plain
          caption={chainText.exportsCaption}
          columns={columnsOf(desk, setOpenId)}
          rows={rows}
          rowId={({ id }) => id}
        />
      ) : null}
      <ListFoot pages={list} />
      {open ? <ExportFiles deskId={desk.id} made={open} /> : null}
    </Section>
  );
}

const columnsOf = (desk: DeskAccess, open: (id: string) => void): Column<HistoryExport>[] => [
  {
    id: 'file',
    header: chainText.exportFile,
    cell: ({ id, manifest, done, total }) =>
      manifest ? (
        <LinkButton label={manifest.fileName} onPress={() => open(id)} />
      ) : (
        chainText.exportWriting(done, total)
      ),
  },
  { id: 'rows', header: chainText.exportRows, align: 'end', cell: ({ total }) => total },
  { id: 'by', header: chainText.exportBy, nowrap: true, cell: ({ createdBy }) => createdBy.name },
  {
    id: 'at',
    header: chainText.exportAt,
    nowrap: true,
    cell: ({ createdAt }) => formatInstant(createdAt, desk.timeZone),
  },
];
