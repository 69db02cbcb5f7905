import { describe, expect, it } from 'vitest';
import { analyseLoop } from '../../lib/control/margins';
import { idealController } from '../../lib/control/types';
import { checkLoop, type Engine } from '../../lib/sim/check';
import { simulateExact } from '../../lib/sim/exact';
import { automaticHorizon } from '../../lib/sim/horizon';
import { trySimulateOde } from '../../lib/sim/ode';
import { controllerOf, plantOf, referenceLoops } from '../support/reference-loops';

/** The 70 loops of loops-open.json (tests/reference/SOURCES.md); here only as a varied set of loops. */
const loops = referenceLoops('loops-open.json');
const stable = loops.filter((loop) => loop.expect.stable);

const ode: Engine = (plant, controller, options) => {
  const result = trySimulateOde(plant, controller, options);
  return result.ok ? result.value : null;
};

describe('automaticHorizon', () => {
  it('shows both responses at rest for the last fifth, over at least four dead times', () => {
    for (const loop of stable) {
      const [plant, controller] = [plantOf(loop), controllerOf(loop)];
      const { horizonS, settled } = automaticHorizon(
        plant,
        controller,
        analyseLoop(plant, controller).margins,
      );
      expect(horizonS).toBeGreaterThanOrEqual(4 * plant.deadTimeS);
      expect(settled, loop.id).toBe(true);
      const { setpoint, load } = simulateExact(plant, controller, { horizonS });
      const shown = Math.ceil(0.8 * 599);
      const within = (y: Float64Array, final: number, band: number) =>
        Math.max(...y.subarray(shown).map((value) => Math.abs(value - final))) <= band * (1 + 1e-9);
      expect(within(setpoint.y, setpoint.final, 0.005 * Math.abs(setpoint.final)), loop.id).toBe(true);
      expect(within(load.y, load.final, 0.005 * Math.abs(load.peak)), loop.id).toBe(true);
    }
  });
});

describe('checkLoop', () => {
  it('states nothing about the responses of an unstable loop', () => {
    for (const loop of loops.filter((each) => !each.expect.stable)) {
      const check = checkLoop(plantOf(loop), controllerOf(loop), { secondEngine: ode });
      expect([check.stable, check.setpoint, check.load, check.engines]).toEqual([false, null, null, null]);
    }
  });

  it('takes a given horizon as it is', () => {
    const [plant, controller] = [
      { num: [1], den: [1, 1], deadTimeS: 0.3 },
      idealController({ kp: 1, ti: 1 }),
    ];
    const check = checkLoop(plant, controller, { horizonS: 3.21, points: 50 });
    expect(check.setpoint?.horizonS).toBe(3.21);
    expect(check.load?.t[49]).toBe(3.21);
    expect(check.engines).toBeNull();
  });

  it('has both engines agree to 1/10000 on every stable reference loop', () => {
    for (const loop of stable) {
      const horizonS = loop.expect.setpoint?.horizon;
      const { engines } = checkLoop(plantOf(loop), controllerOf(loop), { horizonS, secondEngine: ode });
      expect(engines?.agreement ?? Infinity, loop.id).toBeLessThan(1e-4);
    }
  });

  it('says so when the second engine disagrees', () => {
    const wrong: Engine = (plant, controller, options) =>
      simulateExact(plant, { ...controller, kp: 1.01 * controller.kp }, options);
    const [plant, controller] = [
      { num: [1], den: [1, 1], deadTimeS: 0.3 },
      idealController({ kp: 1, ti: 1 }),
    ];
    const { engines, warnings } = checkLoop(plant, controller, { secondEngine: wrong });
    expect(engines?.agreement).toBeGreaterThan(1e-4);
    expect(warnings.some((sentence) => sentence.includes('not a check'))).toBe(true);
  });
});
