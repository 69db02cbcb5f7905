'use client';

import { useId, type Dispatch } from 'react';
import type { AxisUnits } from '@/lib/control/forms';
import { REQUIREMENT_ITEMS } from '@/lib/requirement';
import { WorksheetSection } from '../ui/section';
import type { WorksheetAction, WorksheetState } from './state';
import { limitUnit } from './units';

interface Props {
  state: WorksheetState;
  dispatch: Dispatch<WorksheetAction>;
  errors: Readonly<Record<string, string>>;
  units: AxisUnits;
}

function LimitField({
  item,
  state,
  dispatch,
  errors,
  units,
}: Props & { item: (typeof REQUIREMENT_ITEMS)[number] }) {
  const id = useId();
  const unit = limitUnit(item.unit, units);
  const error = errors[`limit.${item.key}`];
  const text = state.requirement[item.key] ?? '';
  return (
    <div className="min-w-0">
      <div
        className={`flex min-h-10 items-center gap-1.5 rounded border bg-sheet pl-2.5 focus-within:outline-3 focus-within:outline-offset-1 focus-within:outline-petrol ${error ? 'border-2 border-brick' : text ? 'border-ink' : 'border-dashed border-edge'}`}
      >
        <label htmlFor={id} className="min-w-0 grow cursor-text text-sm leading-tight">
          {item.label}
          {unit && unit.length > 2 ? <span className="block text-xs text-soft">{unit}</span> : null}
        </label>
        <span className="text-sm text-soft" aria-hidden="true">
          {item.kind === 'max' ? '≤' : '≥'}
        </span>
        <input
          id={id}
          inputMode="decimal"
          autoComplete="off"
          value={text}
          placeholder="none"
          aria-invalid={error ? true : undefined}
          aria-describedby={error ? `${id}-error` : undefined}
          title={item.meaning}
          onChange={(event) => dispatch({ do: 'limit', key: item.key, text: event.target.value })}
          className="figure h-9 w-16 bg-transparent text-right font-semibold outline-none"
        />
        <span className="w-5 pr-1.5 text-sm text-soft">{unit.length <= 2 ? unit : ''}</span>
      </div>
      {error ? (
        <p id={`${id}-error`} role="alert" className="text-xs font-semibold text-brick">
          ✕ {error}
        </p>
      ) : null}
    </div>
  );
}

export function RequirementSection(props: Props) {
  const stated = REQUIREMENT_ITEMS.filter(
    ({ key }) => (props.state.requirement[key] ?? '').trim() !== '',
  ).length;
  const note = stated === 0 ? 'no limit stated yet' : `${stated} ${stated === 1 ? 'limit' : 'limits'}`;
  return (
    <WorksheetSection number={2} title="Requirement" note={note}>
      <div className="grid grid-cols-1 gap-1.5 min-[480px]:grid-cols-2">
        {REQUIREMENT_ITEMS.map((item) => (
          <LimitField key={item.key} item={item} {...props} />
        ))}
      </div>
      <p className="mt-2 text-xs text-soft">
        Leave a limit empty and it is not judged. Point or comma, as you type it.
      </p>
    </WorksheetSection>
  );
}
