import { decimalsOfStep, formatNumber, roundSignificant, roundToStep } from '../../units';
import type { Convention, DeviceName, PerRow } from './types';

/** Digits shown where the device's resolution is not stated. */
const SHOWN_DIGITS = 6;

/** The setting for one parameter out of one value for all, or one each. */
export function settingOf<T extends number>(setting: PerRow<T> | undefined, name: DeviceName): T | undefined {
  return typeof setting === 'object' ? setting[name] : setting;
}

/** The device's number, rounded to its resolution and as its display shows it. */
export function atResolution(
  exact: number,
  name: DeviceName,
  convention: Convention,
): { value: number; text: string } {
  const step = settingOf(convention.step, name) ?? (convention.integer ? 1 : undefined);
  const decimals = settingOf(convention.decimals, name);
  const significant = settingOf(convention.significant, name);
  if (step !== undefined) {
    const value = roundToStep(exact, step);
    return { value, text: formatNumber(value, { decimals: decimals ?? decimalsOfStep(step) }) };
  }
  if (decimals !== undefined) {
    const value = roundToStep(exact, Number(`1e${-decimals}`));
    return { value, text: formatNumber(value, { decimals }) };
  }
  if (significant !== undefined) {
    const value = roundSignificant(exact, significant);
    return { value, text: formatNumber(value, { significant }) };
  }
  return { value: exact, text: formatNumber(exact, { significant: SHOWN_DIGITS }) };
}
