export interface TimeScale {
  unit: string;
  /** Seconds per unit. */
  seconds: number;
}

/** The unit in which a time axis of this length reads with few digits. */
export function timeScale(horizonS: number): TimeScale {
  if (horizonS < 1.5e-3) return { unit: 'µs', seconds: 1e-6 };
  if (horizonS < 1.5) return { unit: 'ms', seconds: 1e-3 };
  if (horizonS < 600) return { unit: 's', seconds: 1 };
  if (horizonS < 6 * 3600) return { unit: 'min', seconds: 60 };
  return { unit: 'h', seconds: 3600 };
}
