import type { FinalValues } from '../final-values';
import { loadMetrics, setpointMetrics } from '../metrics';
import type { LoadResponse, SetpointResponse } from '../types';
import { cutAt } from './cut-at';
import type { ResponseSource } from './responses';

/** Both responses with their figures; the source has been used up then, its trajectories end at the horizon. */
export function responseFigures(
  source: ResponseSource,
  final: FinalValues,
  horizonS: number,
  points: number,
): { setpoint: SetpointResponse; load: LoadResponse } {
  const upTo = (kind: 'setpoint' | 'load') => cutAt(source.upTo(kind, horizonS), horizonS);
  return {
    setpoint: setpointMetrics(upTo('setpoint'), { horizonS, points, final: final.setpoint }),
    load: loadMetrics(upTo('load'), { horizonS, points, final: final.load }),
  };
}
