import { useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { marketEditorText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import {
  largestFileBytes,
  type MarketFileProblem,
  type MarketFileReport,
} from '@/shared/contracts/market-data';
import { errorOf } from '@/hooks/error-of';
import { isTooLarge, useFileCheck } from '@/hooks/use-market-data';

export type FileSectionProps = {
  deskId: string;
  /** The file is in order: its numbers go into the grid. */
  onRead: (report: MarketFileReport) => void;
  onSample: () => void;
};

const largestText = `${largestFileBytes / 1_048_576}\u00a0MB`;

/** Reads a file without writing anything: lists its problems, or hands its numbers over. */
export function FileSection({ deskId, onRead, onSample }: FileSectionProps) {
  const input = useRef<HTMLInputElement>(null);
  const [name, setName] = useState('');
  const [refused, setRefused] = useState(false);
  const check = useFileCheck(deskId);
  const choose = (file: File | undefined) => {
    if (!file) return;
    setName(file.name);
    setRefused(isTooLarge(file));
    if (isTooLarge(file)) return check.reset();
    check.mutate(file, {
      onSuccess: (report) => {
        if (report.problemCount === 0) onRead(report);
      },
    });
  };
  return (
    <Section title={marketEditorText.fileTitle}>
      <Text tone="muted">{marketEditorText.fileBody}</Text>
      <input
        ref={input}
        className="visually-hidden"
        type="file"
        accept=".csv,text/csv"
        aria-label={marketEditorText.chooseFile}
        tabIndex={-1}
        onChange={(event) => {
          choose(event.target.files?.[0]);
          // The same file can be chosen again once it was mended.
          event.target.value = '';
        }}
      />
      <View style={styles.acts}>
        <Button
          kind="secondary"
          label={marketEditorText.chooseFile}
          busy={check.isPending}
          onPress={() => input.current?.click()}
        />
        <Button kind="quiet" label={marketEditorText.sample} onPress={onSample} />
      </View>
      {refused ? (
        <Notice tone="brick" title={marketEditorText.tooLarge(name, largestText)} />
      ) : null}
      {check.isError ? <Notice tone="brick" title={errorOf(check.error).message} /> : null}
      {check.data ? <Report name={name} report={check.data} /> : null}
    </Section>
  );
}

function Report({ name, report }: { name: string; report: MarketFileReport }) {
  const { problems, problemCount, quotes, missing } = report;
  if (problemCount === 0)
    return (
      <Notice
        tone="moss"
        title={marketEditorText.fileTitleOk(name, quotes.length)}
        body={[
          marketEditorText.fileOkBody,
          ...(missing.length > 0 ? [marketEditorText.fileMissing(missing.join(', '))] : []),
        ].join(' ')}
      />
    );
  const leftOut = problemCount - problems.length;
  return (
    <>
      <Notice tone="brick" title={marketEditorText.problemsTitle(name, problemCount)} />
      <DataTable
        plain
        caption={marketEditorText.problemsCaption}
        columns={columns}
        rows={problems.map((problem, index) => ({ ...problem, id: String(index) }))}
        rowId={({ id }) => id}
        card={(problem) => <ProblemCard problem={problem} />}
      />
      {leftOut > 0 ? <Text tone="muted">{marketEditorText.problemsLeftOut(leftOut)}</Text> : null}
    </>
  );
}

const rowText = ({ row }: MarketFileProblem) =>
  row === 0 ? marketEditorText.wholeFile : String(row);
const columnText = ({ row, column }: MarketFileProblem) =>
  column ?? (row === 0 ? '' : marketEditorText.wholeRow);

const columns: readonly Column<MarketFileProblem & { id: string }>[] = [
  { id: 'row', header: marketEditorText.problemColumns.row, nowrap: true, cell: rowText },
  { id: 'column', header: marketEditorText.problemColumns.column, nowrap: true, cell: columnText },
  {
    id: 'message',
    header: marketEditorText.problemColumns.message,
    cell: ({ message }) => message,
  },
];

function ProblemCard({ problem }: { problem: MarketFileProblem }) {
  const place =
    problem.row === 0
      ? marketEditorText.wholeFile
      : marketEditorText.problemPlace(rowText(problem), columnText(problem));
  return (
    <View>
      <Text size="small" tone="muted" tabular>
        {place}
      </Text>
      <Text>{problem.message}</Text>
    </View>
  );
}

const styles = StyleSheet.create({
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
});
