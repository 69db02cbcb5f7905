'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useReducer, useState } from 'react';
import { toDevice } from '@/lib/control/forms';
import { Notice } from '../ui/notice';
import { CheckSection, VerdictLine } from './check-section';
import { GainsSection } from './gains-section';
import { HandOverDialog } from './hand-over-dialog';
import { HandOverSection } from './hand-over-section';
import { KeepDialog, type Kept } from './keep-dialog';
import { PlantSection } from './plant-section';
import { RequirementSection } from './requirement-section';
import { initialState } from './initial-state';
import { previewRequest, readFields, worksheetReducer } from './state';
import type { WorksheetAxis } from './types';
import { usePreview } from './use-preview';
import { WorksheetHead } from './worksheet-head';

/**
 * The one page of an axis: plant, requirement, gains, check and hand-over from top to bottom. Everything on it
 * follows its fields at once; the server computes again before anything is kept.
 */
export function Worksheet({ axis }: { axis: WorksheetAxis }) {
  const router = useRouter();
  const [state, dispatch] = useReducer(worksheetReducer, axis, initialState);
  const [dialog, setDialog] = useState<'keep' | 'hand-over' | null>(null);
  const [kept, setKept] = useState<Kept | null>(null);

  const fields = useMemo(() => readFields(state), [state]);
  const inService = useMemo(
    () =>
      axis.inService ? { label: `v${axis.inService.version}`, controller: axis.inService.controller } : null,
    [axis.inService],
  );
  const request = useMemo(() => previewRequest(state, fields, inService), [state, fields, inService]);
  const { preview, failure } = usePreview(request);
  const controller = preview?.controller ?? null;
  const device = useMemo(
    () => (controller ? toDevice(controller, axis.convention, axis.units) : null),
    [controller, axis.convention, axis.units],
  );

  const clean = Object.keys(fields.errors).length === 0;
  const stable = preview?.cases.every(({ check }) => check?.stable) ?? false;
  const pending = axis.lastKept && axis.lastKept.version !== axis.inService?.version ? axis.lastKept : null;
  const newLabel = `v${axis.lastVersion + 1}`;

  return (
    <>
      <WorksheetHead
        axis={axis}
        canKeep={clean && stable && device?.ok === true}
        canHandOver={pending !== null}
        onKeep={() => setDialog('keep')}
        onHandOver={() => setDialog('hand-over')}
      />
      {failure ? (
        <div className="mt-3">
          <Notice tone="bad" title="The check could not be computed">
            {failure}
          </Notice>
        </div>
      ) : null}
      {kept ? (
        <div className="mt-3">
          <Notice tone="good" title={`Kept as v${kept.version}`} live>
            {pending ? 'It can be handed over now.' : 'It stands among the versions of this axis.'}
          </Notice>
        </div>
      ) : null}
      <div className="grid grid-cols-1 gap-x-9 xl:grid-cols-[minmax(400px,480px)_minmax(0,1fr)]">
        <div className="min-w-0">
          <PlantSection
            state={state}
            dispatch={dispatch}
            shown={preview?.cases[state.shown]}
            gainUnit={`${axis.units.input} per ${axis.units.output}`}
          />
          <RequirementSection state={state} dispatch={dispatch} errors={fields.errors} units={axis.units} />
          <GainsSection
            state={state}
            dispatch={dispatch}
            errors={fields.errors}
            preview={preview}
            device={device}
            convention={axis.convention}
          />
          <div className="hidden xl:block">
            <HandOverSection axis={axis} />
          </div>
        </div>
        <div className="min-w-0 xl:sticky xl:top-0 xl:max-h-screen xl:self-start xl:overflow-y-auto xl:pr-1">
          <CheckSection
            preview={preview}
            shown={state.shown}
            units={axis.units}
            newLabel={newLabel}
            beforeLabel={inService?.label ?? ''}
          />
        </div>
        <div className="border-t border-rule xl:hidden">
          <HandOverSection axis={axis} />
        </div>
      </div>
      <div className="sticky bottom-0 z-10 -mx-4 border-t border-ink bg-paper xl:hidden">
        <VerdictLine preview={preview} />
      </div>
      <KeepDialog
        open={dialog === 'keep'}
        onOpenChange={(open) => setDialog(open ? 'keep' : null)}
        axis={axis}
        preview={preview}
        state={state}
        fields={fields}
        onKept={(version) => {
          setKept(version);
          router.refresh();
        }}
      />
      {pending ? (
        <HandOverDialog
          key={pending.id}
          open={dialog === 'hand-over'}
          onOpenChange={(open) => setDialog(open ? 'hand-over' : null)}
          axis={axis}
          to={pending}
        />
      ) : null}
    </>
  );
}
