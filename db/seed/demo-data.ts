/**
 * The invented plant of the demo: Brackwater Packing fills and seals trays. Its numbers are made up, though a plant
 * of the kind could have them.
 */
interface DemoVersion {
  readonly rule: string;
  readonly type: 'P' | 'PI' | 'PID';
  readonly aggressiveness: number;
  readonly reason: string;
}

interface DemoAxis {
  readonly tag: string;
  readonly name: string;
  readonly measurementUnit: string;
  readonly outputUnit: string;
  readonly actuatorLow: number;
  readonly actuatorHigh: number;
  readonly sampleTimeS: number;
  readonly deviceLabel: string;
  readonly convention: Record<string, unknown>;
  readonly requirement: Record<string, number>;
  readonly loadCases: readonly { readonly name: string; readonly text: string }[];
  readonly versions: readonly DemoVersion[];
}

export interface DemoMachine {
  readonly site: string;
  readonly name: string;
  readonly cautions: string;
  readonly axes: readonly DemoAxis[];
}

const SECONDS = { gain: 'gain', integral: 'seconds', derivative: 'seconds' };

export const BRACKWATER: readonly DemoMachine[] = [
  {
    site: 'Hall A',
    name: 'Tray sealer 2',
    cautions:
      'Seal jaws stay hot for half an hour after switching off.\nThe film knife is exposed when the guard is open.',
    axes: [
      {
        tag: 'TC-11',
        name: 'Seal-jaw heater',
        measurementUnit: '°C',
        outputUnit: '%',
        actuatorLow: 0,
        actuatorHigh: 100,
        sampleTimeS: 0.5,
        deviceLabel: 'TS2-TC11',
        convention: {
          form: 'ideal',
          gain: 'proportional-band',
          integral: 'minutes',
          derivative: 'minutes',
          inputSpan: 250,
          outputSpan: 100,
          decimals: 2,
        },
        requirement: { overshootMax: 15, phaseMarginMin: 50, msMax: 1.8, loadRecoveryMax: 560 },
        loadCases: [{ name: 'nominal', text: '2.1 e^(-14s)/((140s+1)(22s+1))' }],
        versions: [
          {
            rule: 'simc',
            type: 'PI',
            aggressiveness: 0.25,
            reason: 'First set after the heater cartridges were renewed.',
          },
          { rule: 'simc', type: 'PID', aggressiveness: 0.5, reason: 'Jaws too slow after a film change.' },
        ],
      },
      {
        tag: 'WT-12',
        name: 'Film tension',
        measurementUnit: 'N',
        outputUnit: '%',
        actuatorLow: -100,
        actuatorHigh: 100,
        sampleTimeS: 0.005,
        deviceLabel: 'TS2-A3',
        convention: { form: 'parallel', gain: 'gain', integral: 'gain', derivative: 'gain', decimals: 4 },
        requirement: {},
        loadCases: [
          { name: 'full reel', text: '0.8*900/(s^2+24s+900) * e^(-0.012s)' },
          { name: 'empty reel', text: '0.8*1600/(s^2+26s+1600) * e^(-0.012s)' },
        ],
        versions: [],
      },
    ],
  },
  {
    site: 'Hall A',
    name: 'Infeed conveyor 1',
    cautions: 'Belt starts without warning when the cell is in automatic.',
    axes: [
      {
        tag: 'SC-05',
        name: 'Belt speed',
        measurementUnit: 'm/min',
        outputUnit: '%',
        actuatorLow: 0,
        actuatorHigh: 100,
        sampleTimeS: 0.02,
        deviceLabel: 'IC1-VFD1',
        convention: { form: 'ideal', ...SECONDS, decimals: 3 },
        requirement: { overshootMax: 5, settlingTimeMax: 3, gainMarginMin: 2.5 },
        loadCases: [{ name: 'nominal', text: 'K=0.62 tau=0.85 theta=0.12' }],
        versions: [{ rule: 'lambda', type: 'PI', aggressiveness: 0.5, reason: 'Commissioning.' }],
      },
    ],
  },
  {
    site: 'Hall B',
    name: 'Palletiser 1',
    cautions: 'The lift table sinks when its drive is disabled: block it before reaching in.',
    axes: [
      {
        tag: 'LT-20',
        name: 'Lift-table position',
        measurementUnit: 'mm',
        outputUnit: '%',
        actuatorLow: -100,
        actuatorHigh: 100,
        sampleTimeS: 0.004,
        deviceLabel: 'PL1-A6',
        convention: { form: 'parallel', gain: 'gain', integral: 'gain', derivative: 'gain', decimals: 4 },
        requirement: { overshootMax: 30, phaseMarginMin: 40, msMax: 2 },
        loadCases: [{ name: 'nominal', text: '5.4 e^(-0.03s)/(s(0.09s+1))' }],
        versions: [
          { rule: 'simc', type: 'PID', aggressiveness: 0.4, reason: 'Commissioning with an empty table.' },
        ],
      },
      {
        tag: 'PT-21',
        name: 'Pan axis, yaw rate',
        measurementUnit: '°/s',
        outputUnit: '%',
        actuatorLow: -100,
        actuatorHigh: 100,
        sampleTimeS: 0.002,
        deviceLabel: 'PL1-A7',
        convention: { form: 'parallel', gain: 'gain', integral: 'gain', derivative: 'gain', decimals: 3 },
        requirement: {
          overshootMax: 20,
          settlingTimeMax: 0.4,
          gainMarginMin: 2.5,
          phaseMarginMin: 45,
          msMax: 1.8,
        },
        loadCases: [
          { name: 'empty', text: '1.25*1936/(s^2+118.8s+1936) * e^(-0.012s)' },
          { name: 'full pallet', text: '1.19*1225/(s^2+88s+1225) * e^(-0.012s)' },
        ],
        versions: [
          { rule: 'simc', type: 'PI', aggressiveness: 0.2, reason: 'Commissioning.' },
          { rule: 'simc', type: 'PI', aggressiveness: 0.5, reason: 'Less lag behind the load.' },
        ],
      },
    ],
  },
  {
    site: 'Services',
    name: 'Utilities',
    cautions: '',
    axes: [
      {
        tag: 'FC-40',
        name: 'Chilled-water flow',
        measurementUnit: 'm³/h',
        outputUnit: '%',
        actuatorLow: 0,
        actuatorHigh: 100,
        sampleTimeS: 0.25,
        deviceLabel: 'UT-FC40',
        convention: {
          form: 'ideal',
          gain: 'gain',
          integral: 'repeats-per-minute',
          derivative: 'minutes',
          decimals: 3,
        },
        requirement: { overshootMax: 10, gainMarginMin: 2.5, msMax: 1.7 },
        loadCases: [{ name: 'nominal', text: '0.36 e^(-1.1s)/(3.2s+1)' }],
        versions: [
          { rule: 'simc', type: 'PI', aggressiveness: 0.4, reason: 'After the control valve was replaced.' },
        ],
      },
      {
        tag: 'PC-41',
        name: 'Compressed-air pressure',
        measurementUnit: 'bar',
        outputUnit: '%',
        actuatorLow: 0,
        actuatorHigh: 100,
        sampleTimeS: 0.5,
        deviceLabel: 'UT-PC41',
        convention: { form: 'series', ...SECONDS, decimals: 2 },
        requirement: { phaseMarginMin: 45, loadPeakMax: 0.09 },
        loadCases: [{ name: 'nominal', text: '0.0035 e^(-2.5s)/s' }],
        versions: [
          {
            rule: 'simc',
            type: 'PI',
            aggressiveness: 0.5,
            reason: 'Pressure sagged when both sealers cycled.',
          },
        ],
      },
    ],
  },
];

export const NORTHGATE: readonly DemoMachine[] = [
  {
    site: 'Test field',
    name: 'Pump stand 1',
    cautions: '',
    axes: [
      {
        tag: 'PIC-1',
        name: 'Discharge pressure',
        measurementUnit: 'bar',
        outputUnit: '%',
        actuatorLow: 0,
        actuatorHigh: 100,
        sampleTimeS: 0.1,
        deviceLabel: 'PS1-PIC1',
        convention: { form: 'ideal', ...SECONDS, decimals: 3 },
        requirement: { overshootMax: 10 },
        loadCases: [{ name: 'nominal', text: '0.14 e^(-0.6s)/(2.4s+1)' }],
        versions: [{ rule: 'lambda', type: 'PI', aggressiveness: 0.5, reason: 'Commissioning.' }],
      },
    ],
  },
];
