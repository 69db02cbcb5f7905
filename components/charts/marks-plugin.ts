import type { Chart, ChartType, Plugin } from 'chart.js';
import type { ChartColours } from './colours';

export interface ChartMark {
  x: number;
  y: number;
  text: string;
  yAxis?: string;
}

export interface MarksOptions {
  colours: ChartColours;
  marks: readonly ChartMark[];
  /** What stands at the right end of each data set, by index; '' for none. */
  endLabels: readonly string[];
  font: string;
}

const GAP = 13;

function drawEndLabels(chart: Chart, options: MarksOptions) {
  const { ctx, chartArea } = chart;
  const places = options.endLabels.flatMap((text, index) => {
    const last = chart.getDatasetMeta(index).data.at(-1);
    if (!text || !last || !chart.isDatasetVisible(index)) return [];
    return [{ text, index, y: Math.min(Math.max(last.y, chartArea.top + 4), chartArea.bottom - 4) }];
  });
  places.sort((a, b) => a.y - b.y);
  // Labels that would print over each other are pushed apart, first down, then back into the plot.
  for (let i = 1; i < places.length; i += 1) places[i].y = Math.max(places[i].y, places[i - 1].y + GAP);
  for (let i = places.length - 1, floor = chartArea.bottom; i >= 0; i -= 1, floor -= GAP)
    places[i].y = Math.min(places[i].y, floor);
  ctx.font = `600 ${options.font}`;
  ctx.textAlign = 'left';
  ctx.textBaseline = 'middle';
  for (const { text, index, y } of places) {
    ctx.fillStyle = String(chart.data.datasets[index].borderColor);
    ctx.fillText(text, chartArea.right + 5, y);
  }
}

function drawMarks(chart: Chart, options: MarksOptions) {
  const { ctx, chartArea, scales } = chart;
  ctx.font = options.font;
  const taken: { left: number; right: number; y: number }[] = [];
  for (const mark of options.marks) {
    const x = scales.x.getPixelForValue(mark.x);
    const y = scales[mark.yAxis ?? 'y'].getPixelForValue(mark.y);
    if (!(
      x >= chartArea.left - 1 &&
      x <= chartArea.right + 1 &&
      y >= chartArea.top - 1 &&
      y <= chartArea.bottom + 1
    ))
      continue;
    ctx.beginPath();
    ctx.arc(x, y, 4, 0, 2 * Math.PI);
    ctx.fillStyle = options.colours.sheet;
    ctx.fill();
    ctx.lineWidth = 1.75;
    ctx.strokeStyle = options.colours.ink;
    ctx.stroke();
    const width = ctx.measureText(mark.text).width;
    const left = x + 8 + width > chartArea.right ? x - 8 - width : x + 8;
    const above = y - 9 < chartArea.top + 6 ? y + 13 : y - 9;
    // Two marks close together: the later one is named below its ring.
    const crowded = taken.some(
      (box) => left < box.right && left + width > box.left && Math.abs(above - box.y) < 14,
    );
    const top = crowded ? y + 14 : above;
    taken.push({ left, right: left + width, y: top });
    ctx.textAlign = 'left';
    ctx.textBaseline = 'middle';
    ctx.lineWidth = 4;
    ctx.strokeStyle = options.colours.paper;
    ctx.strokeText(mark.text, left, top);
    ctx.fillStyle = options.colours.ink;
    ctx.fillText(mark.text, left, top);
  }
}

/** Names each curve at its end and rings the points that the figures beside the plot speak of. */
export const marksPlugin: Plugin<'line', MarksOptions> = {
  id: 'fettleMarks',
  afterDatasetsDraw(chart, _args, options) {
    if (!options.colours) return;
    chart.ctx.save();
    drawEndLabels(chart, options);
    drawMarks(chart, options);
    chart.ctx.restore();
  },
};

declare module 'chart.js' {
  interface PluginOptionsByType<TType extends ChartType> {
    fettleMarks?: TType extends ChartType ? MarksOptions : never;
  }
}
