import { ok, type Result } from '../../result';
import type { FinalValues } from '../final-values';
import { loadMetrics, setpointMetrics } from '../metrics';
import type { LoadResponse, SetpointResponse } from '../types';
import { cutAt } from './cut-at';
import type { ResponseSource } from './responses';
import type { Refusal } from './stepper';

export interface Responses {
  readonly setpoint: SetpointResponse;
  readonly load: LoadResponse;
}

/** Both responses with their figures; the source has been used up then, its trajectories end at the horizon. */
export function responseFigures(
  source: ResponseSource,
  final: FinalValues,
  horizonS: number,
  points: number,
): Result<Responses, Refusal> {
  const setpoint = source.upTo('setpoint', horizonS);
  if (!setpoint.ok) return setpoint;
  const load = source.upTo('load', horizonS);
  if (!load.ok) return load;
  const options = { horizonS, points };
  return ok({
    setpoint: setpointMetrics(cutAt(setpoint.value, horizonS), { ...options, final: final.setpoint }),
    load: loadMetrics(cutAt(load.value, horizonS), { ...options, final: final.load }),
  });
}
