import { lazy, Suspense } from 'react';
import { SkeletonRows } from '@/components/ui/states';
import type { ConvergenceChartProps } from './convergence-chart';
import type { LineChartProps } from './line-chart';

/** Fetched with the first chart that is shown: no other screen waits for what draws them. */
const charts = () => import('./svg-charts');

const LazyConvergenceChart = lazy(async () => ({ default: (await charts()).ConvergenceChart }));
const LazyLineChart = lazy(async () => ({ default: (await charts()).LineChart }));

const placeholder = <SkeletonRows rows={1} height={240} />;

export function ConvergenceChart(props: ConvergenceChartProps) {
  return (
    <Suspense fallback={placeholder}>
      <LazyConvergenceChart {...props} />
    </Suspense>
  );
}

export function LineChart(props: LineChartProps) {
  return (
    <Suspense fallback={placeholder}>
      <LazyLineChart {...props} />
    </Suspense>
  );
}
