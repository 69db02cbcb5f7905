export { bodeCurve, bodeRange, frequencyResponse, type BodeCurve, type FrequencyResponse } from './bode';
