import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { ProgressBar } from '@/components/ui/progress-bar';
import { ErrorState } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { historyText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import type { HistoryExport } from '@/shared/contracts/exports';
import type { HistoryFilter } from '@/shared/contracts/history';
import { errorOf } from '@/hooks/error-of';
import { saveText } from '@/hooks/save-file';
import { useCreateExport, useExport, useSaveExport } from '@/hooks/use-exports';

/** Makes a file of what is filtered, and shows how far it is until it can be kept. */
export function ExportSection({ deskId, filter }: { deskId: string; filter: HistoryFilter }) {
  const create = useCreateExport(deskId);
  const [exportId, setExportId] = useState<string | null>(null);
  const { data: made, error } = useExport(deskId, exportId);
  const ask = (format: 'csv' | 'xlsx') =>
    create.mutate({ format, filter }, { onSuccess: ({ id }) => setExportId(id) });
  const busy = create.isPending || (exportId !== null && made?.status !== 'ready' && !error);
  return (
    <Section title={historyText.exportTitle}>
      <View style={styles.line}>
        <Text tone="muted" style={styles.body}>
          {historyText.exportBody}
        </Text>
        <Button
          kind="secondary"
          label={historyText.exportXlsx}
          busy={busy}
          onPress={() => ask('xlsx')}
        />
        <Button
          kind="secondary"
          label={historyText.exportCsv}
          busy={busy}
          onPress={() => ask('csv')}
        />
      </View>
      {create.error ? <Refusal error={create.error} /> : null}
      {error ? <ErrorState {...errorOf(error)} /> : null}
      {made ? <Outcome deskId={deskId} made={made} /> : null}
    </Section>
  );
}

/** A file that would be too long is refused with what to do, which is an issue of the filter. */
function Refusal({ error }: { error: Error }) {
  const issues = 'issues' in error && Array.isArray(error.issues) ? error.issues : [];
  const [issue] = issues as { message: string }[];
  return <Notice tone="brick" title={issue?.message ?? error.message} />;
}

function Outcome({ deskId, made }: { deskId: string; made: HistoryExport }) {
  if (made.status !== 'ready')
    return (
      <View role="status" style={styles.progress}>
        <ProgressBar done={made.done} total={made.total} />
        <Text tabular>{historyText.exportProgress(made.done, made.total)}</Text>
        <Text size="small" tone="muted">
          {historyText.exportBackground}
        </Text>
      </View>
    );
  return <ExportFiles deskId={deskId} made={made} />;
}

/** The two files that belong together: the values and the manifest. */
export function ExportFiles({ deskId, made }: { deskId: string; made: HistoryExport }) {
  const save = useSaveExport(deskId);
  const { manifest } = made;
  if (!manifest) return null;
  const manifestName = `${manifest.fileName}.manifest.json`;
  return (
    <>
      <Text tabular>{historyText.exportReady(manifest.fileName, manifest.rows)}</Text>
      <View style={styles.acts}>
        <Button
          label={historyText.saveFile}
          busy={save.isPending}
          onPress={() => save.mutate(made.id)}
        />
        <Button
          kind="secondary"
          label={historyText.saveManifest}
          onPress={() =>
            saveText(manifestName, `${JSON.stringify(manifest, null, 2)}\n`, 'application/json')
          }
        />
      </View>
      {save.error ? <ErrorState {...errorOf(save.error)} /> : null}
    </>
  );
}

const styles = StyleSheet.create({
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
  body: { flexGrow: 1, flexShrink: 1, flexBasis: 300 },
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  progress: { gap: space.xs },
});
