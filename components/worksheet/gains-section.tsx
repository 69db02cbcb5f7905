'use client';

import { useId, type Dispatch } from 'react';
import type { Convention, Conversion, DeviceValues } from '@/lib/control/forms';
import { RULES } from '@/lib/control/rules';
import type { ControllerType, IdealController } from '@/lib/control/types';
import { formatNumber, formatTimeS } from '@/lib/units';
import { conventionWords } from '../gain-card/convention-words';
import { GainCard } from '../gain-card/gain-card';
import { SelectField, TextField } from '../ui/field';
import { Notice } from '../ui/notice';
import { WorksheetSection } from '../ui/section';
import { Segmented } from '../ui/segmented';
import { Dial } from './dial';
import type { Preview } from './preview';
import type { HandField, TermField, WorksheetAction, WorksheetState } from './state';

const BY_HAND = 'by-hand';
const TYPES: readonly ControllerType[] = ['P', 'PI', 'PD', 'PID'];

const HAND_FIELDS: readonly { field: HandField; label: string; hint: string; unit?: string }[] = [
  { field: 'kp', label: 'Gain Kp', hint: 'with its sign; larger = stronger' },
  { field: 'ti', label: 'Integral time Ti', hint: 'empty = no integral; larger = weaker', unit: 's' },
  { field: 'td', label: 'Derivative time Td', hint: 'empty = no derivative; larger = stronger', unit: 's' },
];

const TERM_FIELDS: readonly { field: TermField; label: string; placeholder: string; unit?: string }[] = [
  { field: 'n', label: 'Derivative filter N', placeholder: '10' },
  { field: 'b', label: 'Set-point weight b', placeholder: '1' },
  { field: 'c', label: 'Set-point weight c', placeholder: '0' },
  { field: 'tf', label: 'Measurement filter Tf', placeholder: 'none', unit: 's' },
];

export interface GainsProps {
  state: WorksheetState;
  dispatch: Dispatch<WorksheetAction>;
  errors: Readonly<Record<string, string>>;
  preview: Preview | null;
  device: Conversion<DeviceValues> | null;
  convention: Convention;
}

function idealWords({ kp, ti, td, n }: IdealController): string {
  const parts = [`Kp ${formatNumber(kp, { significant: 5 })}`];
  if (Number.isFinite(ti)) parts.push(`Ti ${formatTimeS(ti)}`);
  if (td > 0) parts.push(`Td ${formatTimeS(td)}`, `N ${formatNumber(n, { significant: 3 })}`);
  return parts.join(' · ');
}

function RuleChoice({ state, dispatch, preview }: GainsProps) {
  const rule = RULES.find(({ id }) => id === state.rule);
  return (
    <div className="grid gap-3">
      <SelectField
        label="Rule"
        value={state.source === 'hand' ? BY_HAND : state.rule}
        onChange={(event) => {
          const id = event.target.value;
          const chosen = RULES.find((one) => one.id === id);
          if (chosen)
            dispatch({
              do: 'rule',
              rule: chosen.id,
              types: TYPES.filter((type) => chosen.types.includes(type)),
            });
          else dispatch({ do: 'by-hand', start: preview?.controller ?? null });
        }}
        hint={rule && state.source === 'rule' ? rule.aim : undefined}
      >
        {RULES.map((one) => (
          <option key={one.id} value={one.id}>
            {one.name}
          </option>
        ))}
        <option value={BY_HAND}>Gains typed by hand</option>
      </SelectField>
      {state.source === 'rule' && rule ? (
        <div className="flex flex-wrap items-center gap-3">
          <Segmented
            name="controller-type"
            label="Controller"
            choices={TYPES.map((type) => ({
              value: type,
              label: type,
              unavailable: rule.types.includes(type) ? undefined : `${rule.name} has no ${type} row.`,
            }))}
            value={state.type}
            onChange={(type) => dispatch({ do: 'type', type })}
          />
          {rule.variants.length > 0 ? (
            <label className="flex items-center gap-2 text-sm">
              Variant
              <select
                className="min-h-10 rounded border border-edge bg-sheet px-2"
                value={state.variant ?? ''}
                onChange={(event) => dispatch({ do: 'variant', variant: event.target.value || undefined })}
              >
                <option value="">as published</option>
                {rule.variants.map((variant) => (
                  <option key={variant.id} value={variant.id}>
                    {variant.name}
                  </option>
                ))}
              </select>
            </label>
          ) : null}
        </div>
      ) : null}
    </div>
  );
}

function TuneOn({ state, dispatch }: GainsProps) {
  const id = useId();
  if (state.cases.length < 2 || state.source === 'hand') return null;
  return (
    <p className="mt-3 flex flex-wrap items-center gap-2 text-sm">
      <label htmlFor={id}>Rule applied to the plant of</label>
      <select
        id={id}
        className="min-h-10 rounded border border-edge bg-sheet px-2"
        value={state.tuneOn}
        onChange={(event) => dispatch({ do: 'tune-on', index: Number(event.target.value) })}
      >
        {state.cases.map(({ name }, index) => (
          <option key={index} value={index}>
            {name}
          </option>
        ))}
      </select>
    </p>
  );
}

function Terms({ state, dispatch, errors }: GainsProps) {
  return (
    <details className="mt-3">
      <summary className="min-h-9 cursor-pointer text-sm font-semibold text-petrol">
        Derivative filter, set-point weights, measurement filter
      </summary>
      <div className="mt-2 grid grid-cols-2 gap-3">
        {TERM_FIELDS.map(({ field, label, placeholder, unit }) => (
          <TextField
            key={field}
            label={label}
            inputMode="decimal"
            placeholder={placeholder}
            unit={unit}
            value={state.terms[field]}
            error={errors[`term.${field}`]}
            onChange={(event) => dispatch({ do: 'term', field, text: event.target.value })}
          />
        ))}
        <SelectField
          label="Order of that filter"
          value={state.filterOrder}
          onChange={(event) => dispatch({ do: 'filter-order', order: event.target.value === '2' ? 2 : 1 })}
        >
          <option value={1}>first order</option>
          <option value={2}>second order</option>
        </SelectField>
      </div>
    </details>
  );
}

function RuleAnswer({ preview }: { preview: Preview | null }) {
  const tuning = preview?.tuning;
  if (!tuning) return null;
  if (!tuning.ok)
    return (
      <div className="mt-3">
        <Notice tone="care" title="No recommendation" live>
          {tuning.message}
        </Notice>
      </div>
    );
  return tuning.value.warnings.map((warning) => (
    <p key={warning} className="mt-2 text-sm text-ochre">
      ! {warning}
    </p>
  ));
}

export function GainsSection(props: GainsProps) {
  const { state, dispatch, errors, preview, device, convention } = props;
  const tuning = preview?.tuning?.ok ? preview.tuning.value : null;
  const controller = preview?.controller ?? null;
  return (
    <WorksheetSection
      number={3}
      title="Gains"
      note={state.source === 'rule' ? tuning?.source : 'typed by hand'}
    >
      <RuleChoice {...props} />
      {state.source === 'rule' ? (
        <Dial
          value={state.aggressiveness}
          tuning={tuning}
          onChange={(aggressiveness) => dispatch({ do: 'dial', aggressiveness })}
        />
      ) : (
        <div className="mt-3 grid gap-3 sm:grid-cols-3">
          {HAND_FIELDS.map(({ field, label, hint, unit }) => (
            <TextField
              key={field}
              label={label}
              hint={hint}
              unit={unit}
              inputMode="decimal"
              autoComplete="off"
              className="font-mono"
              value={state.hand[field]}
              error={errors[`hand.${field}`]}
              onChange={(event) => dispatch({ do: 'hand', field, text: event.target.value })}
            />
          ))}
        </div>
      )}
      <TuneOn {...props} />
      <RuleAnswer preview={preview} />
      {device?.ok ? (
        <GainCard
          rows={device.value.rows}
          form={conventionWords(convention)}
          warnings={device.value.warnings}
        />
      ) : null}
      {device && !device.ok ? (
        <div className="mt-3">
          <Notice tone="bad" title="This device can't carry these gains">
            {device.message}
          </Notice>
        </div>
      ) : null}
      {controller ? (
        <p className="figure mt-2 text-sm text-soft">Ideal form: {idealWords(controller)}</p>
      ) : null}
      <Terms {...props} />
    </WorksheetSection>
  );
}
