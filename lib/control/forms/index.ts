export { cascadeToIdeal, idealToCascade, POSITION_GAIN_UNITS, type PositionGainUnit } from './cascade';
export { convert, numbersOf, type DeviceConversion } from './convert';
export { fromDevice, type DeviceNumbers } from './from-device';
export { explainMixUp, type MixUpContext } from './mix-up';
export { idealToParallel, parallelToIdeal, type ControllerRest } from './parallel';
export { DERIVATIVE_UNITS, FILTER_UNITS, GAIN_UNITS, INTEGRAL_UNITS } from './parameter-units';
export { idealToSeries, idealToSeriesWithLag, seriesToIdeal } from './series';
export { toDevice } from './to-device';
export type {
  AxisUnits,
  CascadeForm,
  ControllerForm,
  Conversion,
  Convention,
  DerivativeUnit,
  DeviceName,
  DeviceRow,
  DeviceValues,
  Direction,
  FilterUnit,
  FormsCode,
  GainUnit,
  IntegralUnit,
  ParallelForm,
  SeriesForm,
} from './types';
