import { describe, expect, it } from 'vitest';
import { checkLoop } from '../../lib/sim/check';
import { simulateExact } from '../../lib/sim/exact';
import {
  controllerOf,
  differences,
  plantOf,
  referenceLoops,
  type ExpectedResponses,
} from '../support/reference-loops';

/**
 * Responses of the exact engine against loops-open.json and nonlinear-open.json, computed independently of this
 * repository (SOURCES.md) with errors below 1e-9.
 */
describe('responses of the linear reference loops', () => {
  for (const loop of referenceLoops('loops-open.json')) {
    const { stable, setpoint, load } = loop.expect;
    if (!stable || !setpoint || !load) {
      it(`${loop.id}: unstable, no response is stated`, () => {
        const check = checkLoop(plantOf(loop), controllerOf(loop));
        expect([check.stable, check.setpoint, check.load]).toEqual([false, null, null]);
      });
      continue;
    }
    it(loop.id, () => {
      const want: ExpectedResponses = { setpoint, load };
      const got = simulateExact(plantOf(loop), controllerOf(loop), { horizonS: setpoint.horizon });
      expect(differences(got, want)).toEqual([]);
    });
  }
});

describe('responses of the limited and sampled reference loops', () => {
  for (const loop of referenceLoops('nonlinear-open.json')) {
    const { continuous, sampled } = loop.expect;
    const { limits, sampling } = loop;
    const actuator = limits ? { low: limits.u_min, high: limits.u_max, trackingTimeS: limits.Tt } : {};
    it.runIf(continuous)(`${loop.id} continuous`, () => {
      const want = continuous as ExpectedResponses;
      const options = { horizonS: want.setpoint.horizon, actuator };
      expect(differences(simulateExact(plantOf(loop), controllerOf(loop), options), want)).toEqual([]);
    });
    it.runIf(sampled)(`${loop.id} sampled`, () => {
      const want = sampled as ExpectedResponses;
      const options = { horizonS: want.setpoint.horizon, actuator, sampleTimeS: sampling?.h };
      expect(differences(simulateExact(plantOf(loop), controllerOf(loop), options), want)).toEqual([]);
    });
  }
});
