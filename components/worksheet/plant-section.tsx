'use client';

import type { Dispatch } from 'react';
import { formatNumber, formatTimeS } from '@/lib/units';
import { PlantFormula } from '../plant-formula/plant-formula';
import { Button } from '../ui/button';
import { TextArea, TextField } from '../ui/field';
import { WorksheetSection } from '../ui/section';
import { Segmented } from '../ui/segmented';
import type { PreviewCase } from './preview';
import type { WorksheetAction, WorksheetState } from './state';

type Root = { re: number; im: number };

function rootWords(roots: readonly Root[]): string {
  if (roots.length === 0) return 'none';
  const words: string[] = [];
  for (const { re, im } of roots) {
    if (im < 0) continue;
    const real = formatNumber(re, { significant: 4 });
    words.push(im === 0 ? real : `${real} ± ${formatNumber(im, { significant: 4 })} j`);
  }
  return words.join(', ');
}

function Facts({ shown, gainUnit }: { shown: PreviewCase; gainUnit: string }) {
  if (!shown.description || !shown.parsed.ok) return null;
  const { poles, zeros, dcGain, deadTimeS } = shown.description;
  const facts: [string, string][] = [
    [
      'Gain',
      Number.isFinite(dcGain)
        ? `${formatNumber(dcGain, { significant: 5 })} ${gainUnit}`
        : 'integrating: no steady gain',
    ],
    ['Poles', `${rootWords(poles)} rad/s`],
    ['Zeros', zeros.length ? `${rootWords(zeros)} rad/s` : 'none'],
    ['Dead time', deadTimeS > 0 ? formatTimeS(deadTimeS) : 'none'],
  ];
  return (
    <dl className="mt-2.5 grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-0.5 text-sm">
      {facts.map(([term, text]) => (
        <div key={term} className="contents">
          <dt className="text-soft">{term}</dt>
          <dd className="figure m-0 text-right">{text}</dd>
        </div>
      ))}
    </dl>
  );
}

function Caret({ text, at }: { text: string; at: number }) {
  const line = text.slice(0, at).split('\n').at(-1) ?? '';
  const rest = text.slice(at).split('\n')[0];
  const from = Math.max(0, line.length - 24);
  return (
    <code
      className="mt-1 block overflow-x-auto font-mono text-sm whitespace-pre text-brick"
      aria-hidden="true"
    >
      {line.slice(from)}
      <mark className="bg-brick-wash text-brick underline decoration-2">{rest.slice(0, 1) || ' '}</mark>
      {rest.slice(1, 24)}
    </code>
  );
}

function CaseBar({ state, dispatch }: { state: WorksheetState; dispatch: Dispatch<WorksheetAction> }) {
  const nextName = `Load case ${state.cases.length + 1}`;
  const several = state.cases.length > 1;
  return (
    <div className="mt-3 grid gap-2">
      <div className="flex flex-wrap items-center gap-2">
        {several ? (
          <Segmented
            name="load-case"
            label="Load case"
            choices={state.cases.map(({ name }, index) => ({
              value: String(index),
              label: name || `case ${index + 1}`,
            }))}
            value={String(state.shown)}
            onChange={(index) => dispatch({ do: 'show-case', index: Number(index) })}
          />
        ) : null}
        <Button
          weight="quiet"
          className="text-sm"
          onClick={() => dispatch({ do: 'add-case', name: nextName })}
        >
          Add a load case
        </Button>
        <span className="text-sm text-soft">
          {several
            ? 'The worst decides.'
            : `Load case “${state.cases[0].name}”: an operating point with its own plant.`}
        </span>
      </div>
      {several ? (
        <div className="flex flex-wrap items-end gap-3">
          <TextField
            label="Name of this load case"
            value={state.cases[state.shown].name}
            onChange={(event) => dispatch({ do: 'rename-case', name: event.target.value })}
            maxLength={60}
          />
          <Button weight="quiet" className="text-sm" onClick={() => dispatch({ do: 'remove-case' })}>
            Remove this load case
          </Button>
        </div>
      ) : null}
    </div>
  );
}

const EXAMPLE = '2 e^(-3s)/((10s+1)(5s+1))';

export function PlantSection({
  state,
  dispatch,
  shown,
  gainUnit,
}: {
  state: WorksheetState;
  dispatch: Dispatch<WorksheetAction>;
  shown: PreviewCase | undefined;
  gainUnit: string;
}) {
  const text = state.cases[state.shown].text;
  const empty = text.trim() === '';
  const refused = shown && !shown.parsed.ok && !empty ? shown.parsed : null;
  const warnings = shown?.parsed.ok ? shown.parsed.value.warnings : [];
  return (
    <WorksheetSection number={1} title="Plant" note="from controller output to measured value">
      {shown?.parsed.ok ? (
        <PlantFormula plant={shown.parsed.value.plant} label={`The plant as read: ${text}`} />
      ) : null}
      <div className="mt-3">
        <TextArea
          label="Plant, as you have it"
          hint={
            empty
              ? `Paste two coefficient lists, an expression in s such as ${EXAMPLE}, or named values such as K=2 tau=10 theta=3.`
              : undefined
          }
          error={refused?.message}
          rows={2}
          spellCheck={false}
          className="font-mono"
          placeholder={EXAMPLE}
          value={text}
          onChange={(event) => dispatch({ do: 'plant', text: event.target.value })}
        />
        {refused?.at !== undefined ? <Caret text={text} at={refused.at} /> : null}
        {warnings.map((warning) => (
          <p key={warning} className="mt-1 text-sm text-ochre">
            ! {warning}
          </p>
        ))}
      </div>
      {shown ? <Facts shown={shown} gainUnit={gainUnit} /> : null}
      <CaseBar state={state} dispatch={dispatch} />
    </WorksheetSection>
  );
}
