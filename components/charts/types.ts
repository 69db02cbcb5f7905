import type { CurveTone } from './colours';
import type { ChartMark } from './marks-plugin';

export interface Curve {
  label: string;
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  tone: CurveTone;
  /** Line pattern; curves differ by it and by the label at their end, never by colour alone. */
  dash?: readonly number[];
  /** `y2` draws on the right-hand scale. */
  axis?: 'y' | 'y2';
}

export interface CurveChartProps {
  title: string;
  unit: string;
  xUnit: string;
  curves: readonly Curve[];
  marks?: readonly ChartMark[];
  logX?: boolean;
  /** Horizontal lines across the plot, e.g. the set-point. */
  levels?: readonly number[];
  yRange?: { min: number; max: number; step?: number };
  /** What the picture shows, in words with its numbers. */
  description: string;
  height?: number;
}
