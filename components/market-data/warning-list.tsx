import { View } from 'react-native';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { marketEditorText } from '@/constants/texts/market-data';
import { warningKey, type MarketWarning } from '@/shared/market-warnings';

export type WarningListProps = {
  warnings: readonly MarketWarning[];
  /** Where a person confirms them. */
  confirmation?: { confirmed: boolean; onConfirm: (confirmed: boolean) => void };
};

/** Numbers that are allowed and yet unlikely. */
export function WarningList({ warnings, confirmation }: WarningListProps) {
  if (warnings.length === 0) return null;
  return (
    <Notice
      tone="ochre"
      title={marketEditorText.warningsTitle}
      body={
        <View role="list">
          {warnings.map((warning) => (
            <Text key={warningKey(warning)} role="listitem">
              {warning.message}
            </Text>
          ))}
        </View>
      }
      action={
        confirmation ? (
          <label className="check">
            <input
              type="checkbox"
              checked={confirmation.confirmed}
              onChange={(event) => confirmation.onConfirm(event.target.checked)}
            />
            {marketEditorText.confirmWarnings}
          </label>
        ) : undefined
      }
    />
  );
}
