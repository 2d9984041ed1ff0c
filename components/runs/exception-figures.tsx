import { StyleSheet, View } from 'react-native';
import { RouteDot } from '@/components/charts/route-dot';
import { DataTable, type Column } from '@/components/ui/data-table';
import { FactList, type Fact } from '@/components/ui/fact-list';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { routeLabel } from '@/constants/texts/price';
import { exceptionText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { Route } from '@/shared/contracts/pricing';
import type { RunValuation } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatMoney } from '@/shared/format/money';
import {
  formatDifference,
  formatErrorEstimate,
  formatNumber,
  formatQuantity,
} from '@/shared/format/numbers';
import { routeSizes } from '@/shared/format/terms';
import { tellingDecimals } from './run-words';

type Figure = { role: 'primary' | 'check'; route: Route };

/** The figures of both routes, what they are held against, and where the value comes from. */
export function ExceptionFigures({
  desk,
  valuation,
}: {
  desk: DeskAccess;
  valuation: RunValuation;
}) {
  const { primary, check, trade } = valuation;
  const rows: Figure[] = [
    { role: 'primary', route: primary },
    { role: 'check', route: check },
  ];
  const warnings = [primary, check].flatMap(({ name, result }) =>
    result.ok
      ? result.warnings.map(({ code, message }) => ({ id: `${name} ${code}`, message }))
      : [],
  );
  return (
    <View style={styles.figures}>
      <DataTable
        plain
        caption={exceptionText.figuresCaption(trade.number)}
        columns={columnsOf(valuation)}
        rows={rows}
        rowId={({ role }) => role}
      />
      {warnings.map(({ id, message }) => (
        <Text key={id} size="small" tone="ochre">
          {message}
        </Text>
      ))}
      <FactList facts={factsOf(valuation)} />
      <View style={styles.links}>
        <Link href={`/desks/${desk.id}/history/${valuation.position}`}>
          {exceptionText.valueLink}
        </Link>
        <Link href={`/desks/${desk.id}/trades/${trade.id}`}>{exceptionText.tradeLink}</Link>
      </View>
    </View>
  );
}

const columnsOf = (valuation: RunValuation): Column<Figure>[] => {
  const { currency, unit } = valuation.underlying;
  const decimals = tellingDecimals(valuation);
  return [
    {
      id: 'route',
      header: exceptionText.route,
      cell: ({ role, route }) => <Named role={role} route={route} />,
    },
    {
      id: 'value',
      header: exceptionText.value(currency, unit),
      align: 'end',
      cell: ({ route: { result } }) =>
        result.ok ? formatNumber(result.value, decimals) : exceptionText.noValue,
    },
    {
      id: 'estimate',
      header: exceptionText.estimate,
      align: 'end',
      cell: ({ route: { result } }) => (result.ok ? formatErrorEstimate(result.errorEstimate) : ''),
    },
  ];
};

function Named({ role, route: { name, result } }: Figure) {
  const sizes = result.ok ? routeSizes(result.method) : '';
  return (
    <View>
      <View style={styles.route}>
        <svg width={12} height={12} aria-hidden>
          <RouteDot name={name} x={6} y={6} r={4} />
        </svg>
        <Text>{routeLabel(name)}</Text>
      </View>
      <Text size="small" tone="muted">
        {[exceptionText.roles[role], sizes].filter((word) => word !== '').join(', ')}
      </Text>
    </View>
  );
}

function apartFacts(valuation: RunValuation): Fact[] {
  const { primary, check } = valuation;
  if (!primary.result.ok || !check.result.ok) return [];
  const apart = check.result.value - primary.result.value;
  const value = formatDifference(apart, tellingDecimals(valuation));
  return [{ name: exceptionText.apartLabel, value }];
}

function factsOf(valuation: RunValuation): Fact[] {
  const { tolerance, total, before, underlying } = valuation;
  const decimals = tellingDecimals(valuation);
  return [
    ...apartFacts(valuation),
    { name: exceptionText.tolerance, value: formatQuantity(tolerance, 0, 12) },
    {
      name: exceptionText.position,
      value:
        total === null ? exceptionText.noValue : formatMoney(total, underlying.currency, 'always'),
    },
    {
      name: exceptionText.before,
      value: before
        ? exceptionText.beforeIn(formatNumber(before.value, decimals), before.run.number)
        : exceptionText.noneBefore,
    },
  ];
}

const styles = StyleSheet.create({
  figures: { gap: space.md },
  route: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  links: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.lg, rowGap: space.xs },
});
