import { formatNumber } from '../../units';
import { isStable } from '../stability';
import type { IdealController, Plant } from '../types';
import type { UsedModel } from './pick-row';
import type { RuleFacts } from './types';

interface GivenSettings {
  readonly lambdaS?: number;
  readonly naturalFrequency?: number;
}

export const INTEGRAL_ONLY =
  'Integral action only: the ideal form cannot say that, so its gain is 0 here; take the integral gain ki from the settings in the form of the source.';

export function outsideRange({ deadTimeRatio }: RuleFacts, { parameters }: UsedModel): string[] {
  const { tau, theta } = parameters;
  if (deadTimeRatio === undefined || tau === undefined) return [];
  const [low, high] = deadTimeRatio;
  const ratio = theta / tau;
  // Rounding of a plant's coefficients must not push a ratio at the limit outside.
  if (ratio >= low * (1 - 1e-9) && ratio <= high * (1 + 1e-9)) return [];
  const range = low === 0 ? `up to about ${high}` : `from ${low} to ${high}`;
  return [
    `Outside the published range: dead time over time constant is ${formatNumber(ratio, { significant: 3 })}, the rule holds ${range}.`,
  ];
}

/** A model further from the plant than this, relative to its final value, is worth a word. */
const NOTABLE_MODEL_ERROR = 0.1;

export function aboutModel({ method, error }: UsedModel): string[] {
  if (error !== undefined && error > NOTABLE_MODEL_ERROR) {
    const percent = formatNumber(100 * error, { significant: 2 });
    return [
      `The settings are for a reduced model (${method}) whose step response differs from the plant's by up to ${percent} % of the final value.`,
    ];
  }
  return method === 'step fit' && error === undefined
    ? ['The settings are for an integrating model fitted to a plant whose further poles or zeros oscillate.']
    : [];
}

export function aboutLoop(plant: Plant | undefined, controller: IdealController): string[] {
  return plant === undefined || controller.kp === 0 || isStable(plant, controller)
    ? []
    : [
        `With these settings the loop around the plant itself is unstable (derivative filter N = ${controller.n}).`,
      ];
}

export function aboutDetuning({ shape }: UsedModel, { ti }: IdealController, detuning: number): string[] {
  return detuning > 1 && ti < Infinity && shape.startsWith('integrator')
    ? [
        'On an integrating plant a lower gain with the same integral time damps less: watch the sensitivity peak.',
      ]
    : [];
}

export function unusedSettings({ setting }: RuleFacts, request: GivenSettings): string[] {
  const unit = setting?.unit;
  return [
    ...(request.lambdaS !== undefined && unit !== 's'
      ? ['The closed-loop time was not used: this rule has none.']
      : []),
    ...(request.naturalFrequency !== undefined && unit !== 'rad/s'
      ? ['The natural frequency was not used: this rule has none.']
      : []),
  ];
}
