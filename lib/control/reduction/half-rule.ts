import type { PlantFactors } from './factors';
import { numeratorRule, partnerOf } from './numerator-rule';

export interface HalfRuleOptions {
  /** Sample time of the controller in seconds; half of it joins the dead time. */
  readonly sampleTimeS?: number;
  /** Wanted closed-loop time constant in seconds for the numerator rules; the resulting dead time if not given. */
  readonly tauCS?: number;
}

/** Lags in seconds (an integrator is not among them), gain and dead time of the reduced plant. */
export interface HalfRuleModel {
  readonly k: number;
  readonly lags: readonly number[];
  readonly thetaS: number;
}

const LARGEST_NUMBER_OF_ROUNDS = 50;

/**
 * Reduces a plant with real lags to `order` lags (integrators counted as lags): the largest neglected lag is shared
 * half and half between the smallest kept one and the dead time, every smaller lag and every inverse-response time
 * joins the dead time whole. Numerator factors are simplified first, the largest first; their rules need τc = θ, which
 * is found by repetition.
 *
 * @returns null when numerator factors leave no lag or more lead than dead time.
 * Source: Skogestad & Grimholt (2012), eq. 5.12, 5.13 and 5.15; which numerator factor comes first is common practice.
 */
export function halfRule(
  factors: PlantFactors,
  deadTimeS: number,
  order: 1 | 2,
  options: HalfRuleOptions = {},
): HalfRuleModel | null {
  const delayS = deadTimeS + factors.inverse.reduce((sum, t) => sum + t, 0) + (options.sampleTimeS ?? 0) / 2;
  const keep = order - factors.integrators;
  const share = (lags: readonly number[], k: number, leadS: number): HalfRuleModel => {
    const sorted = lags.slice().sort((a, b) => b - a);
    const [half = 0, ...rest] = sorted.slice(keep);
    const kept = sorted.slice(0, keep);
    // An integrator takes its half of the lag without a change.
    if (kept.length > 0) kept[kept.length - 1] += half / 2;
    kept.sort((a, b) => b - a);
    return { k, lags: kept, thetaS: delayS + half / 2 + rest.reduce((sum, tau) => sum + tau, 0) - leadS };
  };
  if (factors.leads.length === 0) return share(factors.lags, factors.k, 0);

  // Two dead times can be consistent with their own rules; the search starts where leads count as negative dead time.
  const leadsS = factors.leads.reduce((sum, t) => sum + t, 0);
  let tauCS = options.tauCS ?? Math.max(delayS, share(factors.lags, factors.k, leadsS).thetaS);
  for (let round = 0; ; round += 1) {
    const simplified = withoutLeads(factors, tauCS);
    const model = share(simplified.lags, simplified.k, simplified.leftOverS);
    if (model.thetaS < 0) return null;
    const settled = options.tauCS !== undefined || Math.abs(model.thetaS - tauCS) <= 1e-12 * tauCS;
    if (settled || round === LARGEST_NUMBER_OF_ROUNDS) return model;
    tauCS = model.thetaS;
  }
}

function withoutLeads(
  factors: PlantFactors,
  tauCS: number,
): { k: number; lags: number[]; leftOverS: number } {
  let { k } = factors;
  let leftOverS = 0;
  const lags = factors.lags.slice();
  for (const leadS of factors.leads) {
    const partner = partnerOf(leadS, lags);
    if (partner === null) {
      leftOverS += leadS;
      continue;
    }
    const { gain, lag } = numeratorRule(leadS, partner, tauCS);
    k *= gain;
    lags.splice(lags.indexOf(partner), 1, ...(lag > 0 ? [lag] : []));
  }
  return { k, lags, leftOverS };
}
