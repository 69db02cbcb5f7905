export { formatNumber, formatQuantity, formatTimeS, type NumberFormat } from './format';
export { parseNumber, type ParseNumberCode, type ParseNumberOptions } from './parse-number';
export { decimalsOfStep, roundSignificant, roundToStep } from './round';
