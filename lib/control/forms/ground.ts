import type { FormsCode } from './types';

/** Spans, counts and sample time of a convention, present where a unit's `needs` names them. */
export interface Ground {
  readonly sampleTimeS: number;
  readonly inputSpan: number;
  readonly outputSpan: number;
  readonly inputCounts: number;
  readonly outputCounts: number;
  /** Both spans are known, so that a plain gain means % per %. */
  readonly hasSpans: boolean;
}

export type Need = 'sampleTimeS' | 'inputSpan' | 'outputSpan' | 'inputCounts' | 'outputCounts';

/** What to say, and with which code, when one is not stated. */
export const MISSING: Readonly<Record<Need, { readonly code: FormsCode; readonly what: string }>> = {
  sampleTimeS: { code: 'SAMPLE_TIME_NEEDED', what: 'the sample time of the controller in seconds' },
  inputSpan: { code: 'SPAN_NEEDED', what: 'the span of the measurement in its unit' },
  outputSpan: { code: 'SPAN_NEEDED', what: 'the span of the output in its unit' },
  inputCounts: { code: 'COUNTS_NEEDED', what: 'the counts that stand for the span of the measurement' },
  outputCounts: { code: 'COUNTS_NEEDED', what: 'the counts that stand for the span of the output' },
};
