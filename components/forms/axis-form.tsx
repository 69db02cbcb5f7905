'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type FieldPath, type UseFormRegister } from 'react-hook-form';
import type { z } from 'zod';
import { axisInput } from '@/lib/schemas/axis';
import { parseNumber } from '@/lib/units';
import { Button } from '../ui/button';
import { SelectField, TextField } from '../ui/field';
import { ProblemNotice } from './problem-notice';
import { useSend } from './use-send';

type Values = z.input<typeof axisInput>;

export type EditedAxis = Omit<Values, 'machineId'> & { id: string; rowVersion: number };

/** A number field as typed, with point or comma: a number, nothing, or what the schema will refuse in words. */
function asNumber(typed: unknown): number | undefined {
  if (typeof typed === 'number') return typed;
  if (typeof typed !== 'string' || typed.trim() === '') return undefined;
  const parsed = parseNumber(typed);
  return parsed.ok ? parsed.value : Number.NaN;
}

const CONVENTIONS = {
  form: [
    ['ideal', 'Ideal: one gain on all three terms'],
    ['parallel', 'Parallel: three gains, each on its own'],
    ['series', 'Series: PI and PD factors multiplied'],
  ],
  gain: [
    ['gain', 'Gain'],
    ['proportional-band', 'Proportional band, % of span'],
  ],
  integral: [
    ['seconds', 'Integral time, seconds'],
    ['minutes', 'Integral time, minutes'],
    ['repeats-per-minute', 'Repeats per minute'],
    ['gain', 'Integral gain, per second'],
    ['per-sample', 'Integral gain, per sample'],
  ],
  derivative: [
    ['seconds', 'Derivative time, seconds'],
    ['minutes', 'Derivative time, minutes'],
    ['gain', 'Derivative gain, seconds'],
    ['per-sample', 'Derivative gain, per sample'],
  ],
} as const;

const CONVENTION_LABELS = {
  form: 'Form of the controller',
  gain: 'Its proportional part is entered as',
  integral: 'Its integral part is entered as',
  derivative: 'Its derivative part is entered as',
} as const;

function errorAt(errors: object, path: string): string | undefined {
  let at: unknown = errors;
  for (const key of path.split('.'))
    at = typeof at === 'object' && at !== null ? (at as Record<string, unknown>)[key] : undefined;
  const message = typeof at === 'object' && at !== null ? (at as { message?: unknown }).message : undefined;
  return typeof message === 'string' ? message : undefined;
}

function numberField(
  register: UseFormRegister<Values>,
  errors: object,
  name: FieldPath<Values>,
  label: string,
  unit?: string,
  hint?: string,
) {
  return (
    <TextField
      label={label}
      unit={unit}
      hint={hint}
      inputMode="decimal"
      autoComplete="off"
      error={errorAt(errors, name)}
      {...register(name, { setValueAs: asNumber })}
    />
  );
}

export function AxisForm({ machineId, axis }: { machineId: string; axis?: EditedAxis }) {
  const { problem, send } = useSend();
  const { register, handleSubmit, formState } = useForm<Values>({
    resolver: zodResolver(axisInput),
    defaultValues: axis
      ? { ...axis, machineId }
      : {
          machineId,
          convention: { form: 'ideal', gain: 'gain', integral: 'seconds', derivative: 'seconds' },
        },
  });
  const { errors, isSubmitting } = formState;
  const submit = handleSubmit((values) => {
    const { machineId: machine, ...fields } = values;
    return axis
      ? send('PATCH', `/axes/${axis.id}`, { ...fields, rowVersion: axis.rowVersion }, (id) => `/axes/${id}`)
      : send('POST', '/axes', { machineId: machine, ...fields }, (id) => `/axes/${id}`);
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-3xl gap-7 pt-6">
      <fieldset className="grid gap-4 sm:grid-cols-2">
        <legend className="mb-3 text-lg font-bold">The axis</legend>
        <TextField
          label="Tag"
          hint="As on the drawing, e.g. TC-11."
          error={errors.tag?.message}
          {...register('tag')}
        />
        <TextField label="What it moves or heats" error={errors.name?.message} {...register('name')} />
        <TextField
          label="Device label"
          hint="As it stands on the device; the technician types it in."
          error={errors.deviceLabel?.message}
          {...register('deviceLabel')}
        />
      </fieldset>
      <fieldset className="grid gap-4 sm:grid-cols-2">
        <legend className="mb-3 text-lg font-bold">Units and limits</legend>
        <TextField
          label="Unit of the measured value"
          hint="e.g. °C, bar, mm"
          error={errors.measurementUnit?.message}
          {...register('measurementUnit')}
        />
        <TextField
          label="Unit of the controller output"
          hint="e.g. %, V, rpm"
          error={errors.outputUnit?.message}
          {...register('outputUnit')}
        />
        {numberField(register, errors, 'actuatorLow', 'Lowest output', undefined, 'empty = no limit')}
        {numberField(register, errors, 'actuatorHigh', 'Highest output', undefined, 'empty = no limit')}
        {numberField(
          register,
          errors,
          'actuatorSlew',
          'Fastest change of the output',
          'per s',
          'empty = no limit',
        )}
        {numberField(
          register,
          errors,
          'sampleTimeS',
          'Sample time of the controller',
          's',
          'empty = as good as continuous',
        )}
      </fieldset>
      <fieldset className="grid gap-4 sm:grid-cols-2">
        <legend className="mb-3 text-lg font-bold">How the device wants its gains</legend>
        {(Object.keys(CONVENTIONS) as (keyof typeof CONVENTIONS)[]).map((key) => (
          <SelectField
            key={key}
            label={CONVENTION_LABELS[key]}
            error={errorAt(errors, `convention.${key}`)}
            {...register(`convention.${key}`)}
          >
            {CONVENTIONS[key].map(([value, words]) => (
              <option key={value} value={value}>
                {words}
              </option>
            ))}
          </SelectField>
        ))}
        {numberField(
          register,
          errors,
          'convention.inputSpan',
          'Span of the measured value',
          undefined,
          'top minus bottom of its range; with both spans the gain is % per %',
        )}
        {numberField(
          register,
          errors,
          'convention.outputSpan',
          'Span of the output',
          undefined,
          'top minus bottom of its range',
        )}
        {numberField(
          register,
          errors,
          'convention.decimals',
          'Decimals that the device shows',
          undefined,
          'empty = not known',
        )}
      </fieldset>
      {problem ? <ProblemNotice problem={problem} /> : null}
      <div>
        <Button weight="primary" type="submit" disabled={isSubmitting}>
          {axis ? 'Save' : 'Add the axis'}
        </Button>
      </div>
    </form>
  );
}
