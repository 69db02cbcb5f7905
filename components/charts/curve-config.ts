import type { ChartData, ChartOptions, ScaleOptionsByType } from 'chart.js';
import { formatNumber } from '@/lib/units';
import type { ChartColours } from './colours';
import type { CurveChartProps } from './types';

const FONT = "12px 'Atkinson Hyperlegible Next Variable', sans-serif";
const FAMILY = "'Atkinson Hyperlegible Next Variable', sans-serif";

type Point = { x: number; y: number };

function points(x: ArrayLike<number>, y: ArrayLike<number>): Point[] {
  return Array.from(x, (value, index) => ({ x: value, y: y[index] }));
}

function span(props: CurveChartProps): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  for (const { x } of props.curves) {
    if (x.length === 0) continue;
    low = Math.min(low, x[0]);
    high = Math.max(high, x[x.length - 1]);
  }
  return low < high ? [low, high] : props.logX ? [0.1, 10] : [0, 1];
}

/** The lowest value of all curves; 0 when none falls below zero by more than a hair of their height. */
function lowest(props: CurveChartProps): number {
  let low = Infinity;
  let high = -Infinity;
  for (const { y } of props.curves)
    for (let i = 0; i < y.length; i += 1) {
      low = Math.min(low, y[i]);
      high = Math.max(high, y[i]);
    }
  return low > -0.005 * (high - low) ? Math.max(0, low) : low;
}

/** Curves first, so that their indices are those of the end labels; the level lines follow. */
export function curveData(props: CurveChartProps, colours: ChartColours): ChartData<'line', Point[]> {
  const [low, high] = span(props);
  const curves = props.curves.map((curve) => ({
    data: points(curve.x, curve.y),
    yAxisID: curve.axis ?? 'y',
    borderColor: colours[curve.tone],
    borderDash: [...(curve.dash ?? [])],
    borderWidth: curve.dash ? 1.75 : 2.25,
    order: 1,
  }));
  const levels = (props.levels ?? []).map((level) => ({
    data: [
      { x: low, y: level },
      { x: high, y: level },
    ],
    yAxisID: 'y',
    borderColor: colours.soft,
    borderDash: [1, 3],
    borderWidth: 1,
    order: 2,
  }));
  return { datasets: [...curves, ...levels] };
}

export function curveOptions(props: CurveChartProps, colours: ChartColours): ChartOptions<'line'> {
  const [low, high] = span(props);
  const longest = Math.max(0, ...props.curves.map((curve) => curve.label.length));
  const ticks = { color: colours.soft, font: { family: FAMILY, size: 12 }, maxRotation: 0 };
  const format = (value: string | number) => formatNumber(Number(value), { significant: 4 });
  const grid = { color: colours.hair, drawTicks: false };
  const title = {
    display: true,
    text: props.xUnit,
    align: 'end' as const,
    color: colours.soft,
    font: { family: FAMILY, size: 12 },
    padding: 0,
  };
  const xAxis = props.logX
    ? {
        type: 'logarithmic' as const,
        min: low,
        max: high,
        grid,
        title,
        ticks: {
          ...ticks,
          // Only whole decades are named: a logarithmic axis with every tick named can't be read.
          callback: (value: string | number) => {
            const decade = Math.log10(Number(value));
            return Math.abs(decade - Math.round(decade)) < 1e-9 ? format(value) : '';
          },
        },
        border: { color: colours.soft },
      }
    : {
        type: 'linear' as const,
        min: low,
        max: high,
        grid,
        title,
        ticks: { ...ticks, maxTicksLimit: 6, includeBounds: false, callback: format },
        border: { color: colours.soft },
      };
  const low0 = lowest(props);
  const yAxis = {
    type: 'linear',
    grid,
    // A response that stays above zero stands on the axis.
    min: props.yRange?.min ?? (low0 >= 0 ? 0 : undefined),
    max: props.yRange?.max,
    ticks: { ...ticks, maxTicksLimit: 6, stepSize: props.yRange?.step, callback: format },
    border: { color: colours.soft },
    grace: '4%',
  } as unknown as ScaleOptionsByType<'linear'>;
  return {
    animation: false,
    responsive: true,
    maintainAspectRatio: false,
    parsing: false,
    normalized: true,
    events: [],
    layout: { padding: { right: 10 + 7 * longest, top: 6 } },
    elements: { point: { radius: 0 }, line: { tension: 0 } },
    scales: { x: xAxis, y: yAxis },
    plugins: {
      fettleMarks: {
        colours,
        marks: props.marks ?? [],
        endLabels: props.curves.map((curve) => curve.label),
        font: FONT,
      },
    },
  };
}
