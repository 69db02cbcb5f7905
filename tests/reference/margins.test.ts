import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { analyseLoop } from '@/lib/control/margins';
import { idealController, type IdealController, type Margins, type Plant } from '@/lib/control/types';

/** Source of the loops and of the settings with their margins: SOURCES.md in this folder. */
const read = (name: string) => JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8'));

type Figure = number | 'inf' | null;

interface ReferenceLoop {
  id: string;
  plant: { num: number[]; den: number[]; delay: number };
  controller: { Kp: number; Ti: number | null; Td: number; N: number; b: number; c: number };
  filter?: { order: 1 | 2; Tf: number };
  expect: { stable: boolean } & Record<string, Figure>;
}

/** Reference name, name in Margins, tolerance relative. Peaks are flat, so their frequencies are less sharp. */
const FIELDS: [string, keyof Margins, number][] = [
  ['GM', 'gainMargin', 1e-9],
  ['GM_dB', 'gainMarginDb', 1e-9],
  ['GM_low', 'gainMarginLow', 1e-9],
  ['w_pc', 'phaseCrossover', 1e-9],
  ['w_pc_low', 'phaseCrossoverLow', 1e-9],
  ['PM_deg', 'phaseMarginDeg', 1e-9],
  ['w_gc', 'gainCrossover', 1e-9],
  ['delay_margin_s', 'delayMarginS', 1e-9],
  ['w_dm', 'delayMarginFrequency', 1e-9],
  ['Ms', 'ms', 1e-9],
  ['w_Ms', 'msFrequency', 1e-6],
  ['Mt', 'mt', 1e-9],
  ['w_Mt', 'mtFrequency', 1e-6],
];

const figure = (value: Figure) => (value === 'inf' ? Infinity : value);

function misses(
  id: string,
  field: string,
  got: number | null,
  wanted: number | null,
  tolerance: number,
): string[] {
  const near =
    got === wanted ||
    (got !== null && wanted !== null && Math.abs(got - wanted) <= tolerance * Math.abs(wanted));
  return near ? [] : [`${id} ${field}: got ${got}, want ${wanted}`];
}

function plantOf({ plant }: ReferenceLoop): Plant {
  return { num: plant.num, den: plant.den, deadTimeS: plant.delay };
}

function controllerOf({ controller, filter }: ReferenceLoop): IdealController {
  const { Kp, Ti, Td, N, b, c } = controller;
  const lowPass = filter && { filter: { timeConstantS: filter.Tf, order: filter.order } };
  return idealController({ kp: Kp, ti: Ti ?? Infinity, td: Td, n: N, b, c, ...lowPass });
}

describe('margins of the 70 reference loops', () => {
  const loops: ReferenceLoop[] = read('loops-open.json').cases;

  it('reads all of them', () => expect(loops).toHaveLength(70));

  it.each(loops.map((loop) => [loop.id, loop] as const))('%s', (id, loop) => {
    const { stable, margins } = analyseLoop(plantOf(loop), controllerOf(loop));
    expect(stable, `${id} stable`).toBe(loop.expect.stable);
    const wrong = FIELDS.flatMap(([field, name, tolerance]) =>
      misses(id, field, margins[name], figure(loop.expect[field]), tolerance),
    );
    expect(wrong).toEqual([]);
  });
});

interface SettingWithMargins {
  rule_id: string;
  plant: 'fopdt' | 'ipdt';
  inputs: { K: number; tau?: number; theta: number };
  ideal: { Kp: number; Ti: number | null; Td: number };
  N: number | null;
  stable: boolean;
  GM: Figure;
  PM: Figure;
  Ms: Figure;
  Mt: Figure;
}

/** Gains and figures have 8 digits; at Ms = 7 the rounding of the gains comes out several times larger. */
const DIGITS = 3e-7;

describe('margins of published settings on plants with dead time', () => {
  const rows: SettingWithMargins[] = read('rules.json').margins;

  it('reads all of them', () => expect(rows).toHaveLength(163));

  it.each(rows.map((row) => [row.rule_id, row] as const))('%s', (id, row) => {
    const { K, tau, theta } = row.inputs;
    const plant: Plant = {
      num: [K],
      den: row.plant === 'ipdt' ? [1, 0] : [tau as number, 1],
      deadTimeS: theta,
    };
    const { Kp, Ti, Td } = row.ideal;
    const controller = idealController({ kp: Kp, ti: Ti ?? Infinity, td: Td, n: row.N ?? Infinity });
    const { stable, margins } = analyseLoop(plant, controller);
    expect(stable, `${id} stable`).toBe(row.stable);
    // The table writes an infinite phase margin as null.
    const phase = row.PM === null ? Infinity : figure(row.PM);
    const wrong = [
      ...misses(id, 'GM', margins.gainMargin, figure(row.GM), DIGITS),
      ...misses(id, 'PM', margins.phaseMarginDeg, phase, DIGITS),
      ...misses(id, 'Ms', margins.ms, figure(row.Ms), DIGITS),
      ...misses(id, 'Mt', margins.mt, figure(row.Mt), DIGITS),
    ];
    expect(wrong).toEqual([]);
  });
});
