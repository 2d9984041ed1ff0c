import { StyleSheet, View } from 'react-native';
import { ConvergenceChart } from '@/components/charts/lazy-charts';
import { Section } from '@/components/ui/card';
import { Icon, type IconName } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { Text, type Tone } from '@/components/ui/text';
import { routeInSentence, routeLabel } from '@/constants/texts/price';
import { studiesText, studyChartText } from '@/constants/texts/studies';
import { color, space } from '@/constants/theme';
import { ladderSeries } from '@/pricing/contract';
import type { Study, StudyRoute } from '@/shared/contracts/studies';
import { formatNumber } from '@/shared/format/numbers';
import { StudyTable } from './study-table';

type Fit = StudyRoute['fits'][number];

const looks: Record<Fit['verdict'], { tone: Exclude<Tone, 'ink'>; icon: IconName }> = {
  'as-expected': { tone: 'moss', icon: 'check' },
  higher: { tone: 'ochre', icon: 'caution' },
  'not-determined': { tone: 'ochre', icon: 'caution' },
  lower: { tone: 'brick', icon: 'caution' },
};

/** One method: the line of verdict, its tables, and beside them the chart. */
export function StudyRouteSection({ study, route }: { study: Study; route: StudyRoute }) {
  const complete = route.rows.length === route.planned;
  const used = ladderSeries.filter((series) => route.rows.some((row) => row.series === series));
  return (
    <View style={styles.route}>
      <Section title={routeLabel(route.name)}>
        {complete ? (
          route.fits.map((fit) => <VerdictLine key={fit.series} route={route} fit={fit} />)
        ) : (
          <Text tone="muted" tabular>
            {studiesText.progress(route.rows.length, route.planned)}
          </Text>
        )}
      </Section>
      <View style={styles.pair}>
        <View style={styles.tables}>
          {used.map((series) => (
            <Section
              key={series}
              title={studiesText.seriesOf(routeLabel(route.name), studiesText.series[series])}
            >
              <StudyTable study={study} route={route} series={series} />
            </Section>
          ))}
          <Notes route={route} />
        </View>
        <View style={styles.chart}>
          <ConvergenceChart
            label={routeInSentence(route.name)}
            series={used.map((series) => ({
              id: series,
              label: used.length > 1 ? studiesText.series[series] : routeLabel(route.name),
              points: route.rows.flatMap(({ series: own, size, error, pastLimit }) =>
                own === series && error !== null && error > 0 && !pastLimit
                  ? [{ size, error }]
                  : [],
              ),
            }))}
            order={route.theoreticalOrder}
            currency={study.underlying.currency}
            sizeLabel={used.includes('all') ? studyChartText.size.grid : studyChartText.size.steps}
          />
        </View>
      </View>
    </View>
  );
}

function VerdictLine({ route, fit }: { route: StudyRoute; fit: Fit }) {
  const { tone, icon } = looks[fit.verdict];
  return (
    <View style={styles.line}>
      <Icon name={icon} size={20} color={color[tone]} />
      <Text size="lead" weight="semibold" tone={tone} style={styles.words}>
        {studiesText.orderSentence(route.name, route.theoreticalOrder, fit)}
      </Text>
    </View>
  );
}

function Notes({ route }: { route: StudyRoute }) {
  const past = route.rows.find(({ pastLimit }) => pastLimit);
  const failure = route.rows.find((row) => row.failure !== null && !row.pastLimit);
  const finest = route.rows.at(-1);
  const unlimited = !past && finest?.stability != null;
  return (
    <>
      {past ? (
        <Notice
          tone="ochre"
          title={studiesText.pastLimit}
          body={past.warning ?? past.failure ?? undefined}
        />
      ) : null}
      {failure?.failure ? (
        <Notice tone="ochre" title={studiesText.noValue} body={failure.failure} />
      ) : null}
      <Text size="small" tone="muted">
        {studiesText.digitsNote}
        {unlimited && finest.stability !== null
          ? ` ${studiesText.stability(formatNumber(finest.stability, 1))}`
          : ''}
      </Text>
    </>
  );
}

const styles = StyleSheet.create({
  route: { gap: space.lg },
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg, alignItems: 'flex-start' },
  tables: { flexGrow: 1, flexShrink: 1, flexBasis: 660, minWidth: 0, gap: space.md },
  chart: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0 },
  line: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  words: { flexShrink: 1 },
});
