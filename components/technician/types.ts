import type { DeviceName, Direction } from '@/lib/control/forms';

export interface SheetRow {
  name: DeviceName;
  label: string;
  unit: string;
  direction: Direction;
  from: number | null;
  fromText: string;
  to: number;
  toText: string;
  off?: string;
}

/** All that the technician's page of one issued change needs, also without a network. */
export interface SheetData {
  changeId: string;
  number: string;
  axis: { id: string; tag: string; name: string; path: string; deviceLabel: string };
  rows: readonly SheetRow[];
  form: string;
  cautions: readonly string[];
  test: string;
  wayBack: string;
}

export const STEPS = ['before', 'found', 'enter', 'close'] as const;
export type Step = (typeof STEPS)[number];

/** What the technician has entered so far; kept on the device until it is sent. */
export interface SheetDraft {
  step: Step;
  acknowledged: readonly number[];
  deviceLabel: string;
  slot: string;
  firmware: string;
  asFound: Readonly<Record<string, string>>;
  asFoundRemark: string;
  asLeft: Readonly<Record<string, string>>;
  saved: '' | 'yes' | 'not-applicable';
  remark: string;
}

export const EMPTY_DRAFT: SheetDraft = {
  step: 'before',
  acknowledged: [],
  deviceLabel: '',
  slot: '',
  firmware: '',
  asFound: {},
  asFoundRemark: '',
  asLeft: {},
  saved: '',
  remark: '',
};
