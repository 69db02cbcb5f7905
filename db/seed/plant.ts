import type { Scope } from '../../lib/auth/scope';
import { parsePlantText } from '../../lib/control/plant-text';
import { tune, type RuleId } from '../../lib/control/rules';
import { createAxis } from '../../lib/services/axes/create-axis';
import { saveLoadCases } from '../../lib/services/axes/save-load-cases';
import { saveRequirement } from '../../lib/services/axes/save-requirement';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { createMachine } from '../../lib/services/machines/create-machine';
import type { DemoMachine } from './demo-data';

export interface SeededAxis {
  readonly axisId: string;
  readonly gainSetIds: readonly string[];
}

type DemoAxis = DemoMachine['axes'][number];

function plantOf(text: string) {
  const read = parsePlantText(text);
  if (!read.ok) throw new Error(`The demo's plant “${text}” can't be read: ${read.message}`);
  return read.value.plant;
}

function apiNumber(value: number): number | 'inf' {
  return Number.isFinite(value) ? value : 'inf';
}

async function keepVersions(scope: Scope, axisId: string, axis: DemoAxis): Promise<string[]> {
  const ids: string[] = [];
  for (const { rule, type, aggressiveness, reason } of axis.versions) {
    const tuned = tune({
      plant: plantOf(axis.loadCases[0].text),
      rule: rule as RuleId,
      type,
      aggressiveness,
    });
    if (!tuned.ok) throw new Error(`The demo's axis ${axis.tag} can't be tuned: ${tuned.message}`);
    const { kp, ti, td, n, b, c } = tuned.value.controller;
    const kept = await keepGainSet(scope, axisId, {
      loadCases: axis.loadCases.map(({ name, text }) => ({ name, plant: { text } })),
      controller: { kp, ti: apiNumber(ti), td, n, b, c },
      rule,
      settings: { type, aggressiveness },
      requirement: axis.requirement,
      reason,
    });
    ids.push(kept.id);
  }
  return ids;
}

/** An axis without versions still opens with its plants and limits. */
async function givePlants(scope: Scope, axisId: string, axis: DemoAxis): Promise<void> {
  const cases = axis.loadCases.map(({ name, text }) => ({ name, plant: { text } }));
  await saveLoadCases(scope, axisId, { loadCases: cases, rowVersion: 1 });
  await saveRequirement(scope, axisId, { requirement: axis.requirement, rowVersion: 2 });
}

/** Machines, axes and versions of a demo plant, all through the services; returned by axis tag. */
export async function seedPlant(
  scope: Scope,
  machines: readonly DemoMachine[],
): Promise<Record<string, SeededAxis>> {
  const seeded: Record<string, SeededAxis> = {};
  for (const { axes: demoAxes, ...machine } of machines) {
    const { id: machineId } = await createMachine(scope, machine);
    for (const axis of demoAxes) {
      const { loadCases: _cases, requirement: _requirement, versions: _versions, ...fields } = axis;
      const { id: axisId } = await createAxis(scope, { machineId, ...fields });
      await givePlants(scope, axisId, axis);
      seeded[axis.tag] = { axisId, gainSetIds: await keepVersions(scope, axisId, axis) };
    }
  }
  return seeded;
}
