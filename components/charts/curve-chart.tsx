'use client';

import {
  Chart,
  LinearScale,
  LineController,
  LineElement,
  LogarithmicScale,
  PointElement,
  type ChartConfiguration,
} from 'chart.js';
import { useEffect, useRef, useSyncExternalStore } from 'react';
import { resolveColours } from './colours';
import { curveData, curveOptions } from './curve-config';
import { marksPlugin } from './marks-plugin';
import type { CurveChartProps } from './types';

Chart.register(LineController, LineElement, PointElement, LinearScale, LogarithmicScale, marksPlugin);

const DARK = '(prefers-color-scheme: dark)';

/** Changes whenever the page's light does, so that the canvas is painted again in the right colours. */
function useLight(): string {
  return useSyncExternalStore(
    (listener) => {
      const media = window.matchMedia(DARK);
      media.addEventListener('change', listener);
      window.addEventListener('fettle:theme', listener);
      return () => {
        media.removeEventListener('change', listener);
        window.removeEventListener('fettle:theme', listener);
      };
    },
    () => `${document.documentElement.dataset.theme ?? ''}${window.matchMedia(DARK).matches}`,
    () => '',
  );
}

/** Curves over one horizontal scale, as a figure with a caption and a description in words. */
export function CurveChart(props: CurveChartProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const chart = useRef<Chart<'line', { x: number; y: number }[]> | null>(null);
  const light = useLight();

  useEffect(() => {
    if (!canvas.current?.parentElement) return;
    const colours = resolveColours(canvas.current.parentElement);
    const data = curveData(props, colours);
    const options = curveOptions(props, colours);
    if (chart.current) {
      chart.current.data = data;
      chart.current.options = options;
      chart.current.update('none');
      return;
    }
    const config: ChartConfiguration<'line', { x: number; y: number }[]> = { type: 'line', data, options };
    chart.current = new Chart(canvas.current, config);
  }, [props, light]);

  useEffect(
    () => () => {
      chart.current?.destroy();
      chart.current = null;
    },
    [],
  );

  return (
    <figure className="min-w-0">
      <figcaption className="mb-1 flex items-baseline justify-between gap-3 text-sm font-semibold">
        {props.title}
        <span className="font-normal text-soft">{props.unit}</span>
      </figcaption>
      <div className="relative" style={{ height: props.height ?? 190 }}>
        <canvas ref={canvas} role="img" aria-label={props.description} />
      </div>
    </figure>
  );
}
