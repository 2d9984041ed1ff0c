import { StyleSheet, View } from 'react-native';
import { findingOf } from '@/components/charts/agreement-finding';
import { RouteDot } from '@/components/charts/route-dot';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { priceText, routeLabel } from '@/constants/texts/price';
import { ticketText } from '@/constants/texts/ticket';
import { space } from '@/constants/theme';
import type { Route } from '@/shared/contracts/pricing';
import { formatDifference, formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { routeSizes } from '@/shared/format/terms';
import { agreementOf, answerOf, decimalsOf, type Evidence } from './evidence';

/** Every route with its sizes, value, error and distance from the answer, then the verdict. */
export function RoutesSection({ evidence }: { evidence: Evidence }) {
  const { routes, verdict } = evidence;
  return (
    <Section title={priceText.trusted} style={styles.section}>
      <View style={styles.table}>
        <DataTable
          plain
          caption={priceText.trusted}
          columns={columnsOf(evidence)}
          rows={routes}
          rowId={({ name }) => name}
        />
      </View>
      <Text tone="muted">
        {verdict === null ? ticketText.comparing : findingOf(agreementOf(evidence, verdict))}
      </Text>
      <RouteWarnings evidence={evidence} />
    </Section>
  );
}

function columnsOf(evidence: Evidence): Column<Route>[] {
  const decimals = decimalsOf(evidence);
  const answer = answerOf(evidence);
  return [
    { id: 'route', header: priceText.route, cell: (route) => <RouteName route={route} /> },
    {
      id: 'value',
      header: priceText.value,
      align: 'end',
      cell: ({ result }) => (result.ok ? formatNumber(result.value, decimals) : priceText.failed),
    },
    {
      id: 'error',
      header: priceText.error,
      align: 'end',
      cell: ({ result }) => (result.ok ? formatErrorEstimate(result.errorEstimate) : ''),
    },
    {
      id: 'apart',
      header: priceText.apart,
      align: 'end',
      cell: ({ name, result }) => {
        if (name === evidence.primary) return priceText.answer;
        if (!result.ok || !answer) return '';
        return formatDifference(result.value - answer.value, decimals);
      },
    },
  ];
}

function RouteName({ route: { name, result } }: { route: Route }) {
  const sizes = result.ok ? routeSizes(result.method) : '';
  return (
    <View style={styles.route}>
      <svg width={12} height={12} aria-hidden>
        <RouteDot name={name} x={6} y={6} r={4} />
      </svg>
      <View style={styles.name}>
        <Text style={styles.unbroken}>{routeLabel(name)}</Text>
        {sizes ? (
          <Text size="small" tone="muted" tabular style={styles.unbroken}>
            {sizes}
          </Text>
        ) : null}
      </View>
    </View>
  );
}

/** What the routes say about their own numbers, and why one gave none. */
export function RouteWarnings({ evidence }: { evidence: Evidence }) {
  const sentences = evidence.routes.flatMap(({ name, result }) =>
    result.ok
      ? result.warnings.map(({ message }) => ({ name, message }))
      : [{ name, message: result.message }],
  );
  if (sentences.length === 0) return null;
  return (
    <View role="list" aria-label={priceText.warnings} style={styles.warnings}>
      {sentences.map(({ name, message }) => (
        <View role="listitem" key={`${name} ${message}`}>
          <Text>
            <Text weight="semibold">{routeLabel(name)}: </Text>
            {message}
          </Text>
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  section: { flexGrow: 1, paddingBottom: space.md },
  table: { marginHorizontal: -space.lg },
  route: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  name: { flexShrink: 0 },
  unbroken: { whiteSpace: 'nowrap' } as object,
  warnings: { gap: space.xs },
});
