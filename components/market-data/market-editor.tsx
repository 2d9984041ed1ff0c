import { useState } from 'react';
import { FormProvider, useController } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { ActionBar } from '@/components/ui/action-bar';
import { Button } from '@/components/ui/button';
import { LiveRegion } from '@/components/ui/live-region';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { marketEditorText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import { saveText } from '@/hooks/save-file';
import { FileSection } from './file-section';
import { marketValues, sampleFile, type GridValues, type Pasted } from './market-form';
import { MarketGrid } from './market-grid';
import { useMarketEditor, type EditorProps } from './use-market-editor';
import { WarningList } from './warning-list';

/** Enters or changes the numbers of a close: typed, pasted, or read from a file. */
export function MarketEditor(props: EditorProps) {
  const { desk, underlyings, draft } = props;
  const editor = useMarketEditor(props);
  const { form, values, warnings, failure, busy, onSubmit, fill, discard } = editor;
  const [pasted, setPasted] = useState<Pasted | null>(null);
  const onPasted = (found: Pasted) => {
    setPasted(found);
    fill(found.values, 'typed');
  };
  return (
    <FormProvider {...form}>
      <form className="form" noValidate onSubmit={(event) => void onSubmit(event)}>
        <View style={styles.date}>
          <DateField isFixed={draft?.restatesId != null} />
        </View>
        <FileSection
          deskId={desk.id}
          onRead={({ quotes }) => fill(marketValues(quotes), 'file')}
          onSample={() =>
            saveText(
              marketEditorText.sampleName,
              sampleFile(underlyings, values),
              'text/csv;charset=utf-8',
            )
          }
        />
        <LiveRegion text={pasted ? marketEditorText.pasted(pasted.rowCount) : ''} />
        {pasted && pasted.unknown.length > 0 ? (
          <Notice tone="ochre" title={marketEditorText.pastedUnknown(pasted.unknown.join(', '))} />
        ) : null}
        <MarketGrid underlyings={underlyings} before={warnings.before} onPasted={onPasted} />
        <WarningList warnings={warnings.warnings} confirmation={warnings} />
        {failure ? <Notice tone="brick" title={failure} /> : null}
        <Text size="small" tone="muted">
          {marketEditorText.kept}
        </Text>
        <ActionBar>
          <Button kind="quiet" label={marketEditorText.discard} onPress={discard} />
          <Button submit label={marketEditorText.save} busy={busy} />
        </ActionBar>
      </form>
    </FormProvider>
  );
}

function DateField({ isFixed }: { isFixed: boolean }) {
  const { field, fieldState } = useController<GridValues>({ name: 'date' });
  const { onChange, ...rest } = field;
  return (
    <TextField
      {...rest}
      label={marketEditorText.date}
      hint={isFixed ? marketEditorText.restatedDay : marketEditorText.dateHint}
      disabled={isFixed}
      onChangeText={onChange}
      error={fieldState.error?.message}
    />
  );
}

const styles = StyleSheet.create({ date: { maxWidth: 260, gap: space.sm } });
