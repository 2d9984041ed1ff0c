import { View } from 'react-native';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Heading, Text } from '@/components/ui/text';
import { chainText } from '@/constants/texts/history';
import type { Anchor } from '@/shared/contracts/chain';
import { formatInstant } from '@/shared/format/dates';

type AnchorsTableProps = { anchors: readonly Anchor[]; timeZone: string };

export function AnchorsTable({ anchors, timeZone }: AnchorsTableProps) {
  return (
    <View>
      <Heading level={3}>{chainText.anchorsTitle}</Heading>
      {anchors.length === 0 ? (
        <Text tone="muted">{chainText.noAnchors}</Text>
      ) : (
        <DataTable
          plain
          caption={chainText.anchorsCaption}
          columns={columnsOf(timeZone)}
          rows={anchors}
          rowId={({ id }) => id}
        />
      )}
    </View>
  );
}

/** Enough of a hash to tell it from any other at a glance. */
const shortHash = (hash: string) => `${hash.slice(0, 12)}…`;

const columnsOf = (timeZone: string): Column<Anchor>[] => [
  {
    id: 'position',
    header: chainText.anchorPosition,
    align: 'end',
    cell: ({ position }) => position,
  },
  {
    id: 'purpose',
    header: chainText.anchorPurpose,
    cell: ({ purpose }) => chainText.purposes[purpose],
  },
  {
    id: 'at',
    header: chainText.anchorAt,
    nowrap: true,
    cell: ({ signedAt }) => formatInstant(signedAt, timeZone),
  },
  {
    id: 'hash',
    header: chainText.anchorHash,
    cell: ({ hash }) => (
      <Text mono size="small">
        {shortHash(hash)}
      </Text>
    ),
  },
];
