'use client';

import { Button } from '../ui/button';
import { TextArea, TextField } from '../ui/field';
import { Notice } from '../ui/notice';
import { readBack, type ReadBack } from './read-back';
import type { SheetData, SheetDraft, SheetRow } from './types';
import { ValueEntry } from './value-entry';

export interface StepProps {
  sheet: SheetData;
  draft: SheetDraft;
  write: (change: Partial<SheetDraft>) => void;
}

type Expected = (row: SheetRow) => number | null;

/** Each row's typed value beside what is expected of it; the other rows' values tell a swap. */
function answersOf(
  sheet: SheetData,
  texts: Readonly<Record<string, string>>,
  expected: Expected,
): ReadBack[] {
  return sheet.rows.map((row) => {
    const others: Record<string, number> = {};
    for (const other of sheet.rows) {
      const value = expected(other);
      if (other.name !== row.name && value !== null) others[other.label] = value;
    }
    return readBack(texts[row.name] ?? '', expected(row), row, others);
  });
}

export function foundAnswers(sheet: SheetData, draft: SheetDraft): ReadBack[] {
  return answersOf(sheet, draft.asFound, ({ from }) => from);
}

export function leftAnswers(sheet: SheetData, draft: SheetDraft): ReadBack[] {
  return answersOf(sheet, draft.asLeft, ({ to }) => to);
}

/** Is it the right device, and are the cautions read? */
export function BeforeStep({ sheet, draft, write }: StepProps) {
  const toggle = (index: number) =>
    write({
      acknowledged: draft.acknowledged.includes(index)
        ? draft.acknowledged.filter((one) => one !== index)
        : [...draft.acknowledged, index],
    });
  return (
    <>
      <h2 className="text-lg">1 The right device, made safe</h2>
      <p className="mt-1 mb-3">
        {sheet.axis.path}
        {sheet.axis.deviceLabel ? (
          <>
            {' '}
            · device label <strong>{sheet.axis.deviceLabel}</strong>
          </>
        ) : null}
      </p>
      <div className="grid gap-3">
        <TextField
          label="Device label, as it stands on the device"
          className="min-h-14"
          value={draft.deviceLabel}
          autoComplete="off"
          onChange={(event) => write({ deviceLabel: event.target.value })}
        />
        <div className="grid grid-cols-2 gap-3">
          <TextField
            label="Slot or profile"
            hint="if it has one"
            className="min-h-14"
            value={draft.slot}
            onChange={(event) => write({ slot: event.target.value })}
          />
          <TextField
            label="Firmware"
            hint="if it shows one"
            className="min-h-14"
            value={draft.firmware}
            onChange={(event) => write({ firmware: event.target.value })}
          />
        </div>
      </div>
      <h3 className="mt-5 mb-2">Cautions: tick each one</h3>
      <ul className="m-0 grid list-none gap-2 p-0">
        {sheet.cautions.map((caution, index) => (
          <li key={caution}>
            <label className="flex min-h-14 cursor-pointer items-center gap-3 rounded border border-edge bg-sheet px-3 py-2">
              <input
                type="checkbox"
                className="size-6 shrink-0 accent-petrol"
                checked={draft.acknowledged.includes(index)}
                onChange={() => toggle(index)}
              />
              <span>{caution}</span>
            </label>
          </li>
        ))}
      </ul>
    </>
  );
}

/** What the device holds now, before anything is touched. */
export function FoundStep({ sheet, draft, write }: StepProps) {
  const answers = foundAnswers(sheet, draft);
  const differs = answers.some(({ kind }) => kind === 'different');
  return (
    <>
      <h2 className="text-lg">2 As found</h2>
      <p className="mt-1 mb-3">
        Read the values off the device and type them in before you touch anything. The new values stay covered
        until then.
      </p>
      <div className="rounded-lg border-[1.5px] border-ink bg-sheet">
        {sheet.rows.map((row, index) => (
          <ValueEntry
            key={row.name}
            row={row}
            label="as found"
            shown={row.from === null ? '–' : row.fromText}
            text={draft.asFound[row.name] ?? ''}
            answer={answers[index]}
            same={row.from === null ? 'noted' : 'as expected'}
            onChange={(text) => write({ asFound: { ...draft.asFound, [row.name]: text } })}
          />
        ))}
      </div>
      {differs ? (
        <div className="mt-3 grid gap-3">
          <Notice tone="care" title="Stop. This is not what should be there." live>
            Call the engineer before you go on. What you found is recorded in any case.
          </Notice>
          <TextArea
            label="Who was asked, and what was said"
            rows={2}
            value={draft.asFoundRemark}
            onChange={(event) => write({ asFoundRemark: event.target.value })}
          />
        </div>
      ) : null}
    </>
  );
}

/** The new values, entered one by one and read back from the device. */
export function EnterStep({ sheet, draft, write }: StepProps) {
  const answers = leftAnswers(sheet, draft);
  return (
    <>
      <h2 className="text-lg">3 Enter the new values</h2>
      <p className="mt-1 mb-3">
        In the device’s order ({sheet.form}). Type what the device shows afterwards.
      </p>
      <div className="rounded-lg border-[1.5px] border-ink bg-sheet">
        {sheet.rows.map((row, index) => (
          <ValueEntry
            key={row.name}
            row={row}
            label="as left"
            shown={row.toText}
            text={draft.asLeft[row.name] ?? ''}
            answer={answers[index]}
            same="reads back the same"
            onChange={(text) => write({ asLeft: { ...draft.asLeft, [row.name]: text } })}
          />
        ))}
      </div>
    </>
  );
}

/** Saved, tested, done. */
export function CloseStep({ sheet, draft, write }: StepProps) {
  return (
    <>
      <h2 className="text-lg">4 Save, first run, close</h2>
      {sheet.test ? (
        <div className="my-3 border-l-[5px] border-petrol bg-petrol-wash px-3.5 py-2.5">
          <strong>Test to run.</strong> <span className="whitespace-pre-line">{sheet.test}</span>
        </div>
      ) : null}
      <fieldset className="mt-3">
        <legend className="mb-2 font-bold">Saved in the device, so that it survives a power cycle?</legend>
        <div className="grid gap-2">
          {(
            [
              ['yes', 'Yes, saved and read again'],
              ['not-applicable', 'Not applicable: this device keeps values by itself'],
            ] as const
          ).map(([value, words]) => (
            <label
              key={value}
              className="flex min-h-14 cursor-pointer items-center gap-3 rounded border border-edge bg-sheet px-3 py-2"
            >
              <input
                type="radio"
                name="saved"
                className="size-6 shrink-0 accent-petrol"
                checked={draft.saved === value}
                onChange={() => write({ saved: value })}
              />
              {words}
            </label>
          ))}
        </div>
      </fieldset>
      <div className="mt-4">
        <TextArea
          label="Remarks"
          rows={2}
          value={draft.remark}
          onChange={(event) => write({ remark: event.target.value })}
        />
      </div>
    </>
  );
}

/** The old values, large, for the moment in which something goes wrong. */
export function WayBackPanel({
  sheet,
  draft,
  onClose,
}: {
  sheet: SheetData;
  draft: SheetDraft;
  onClose: () => void;
}) {
  return (
    <div className="rounded-lg border-2 border-brick bg-sheet p-4" role="alertdialog" aria-label="Old values">
      <h2 className="text-lg text-brick">Go back to the old values</h2>
      <dl className="my-3">
        {sheet.rows.map((row) => (
          <div key={row.name} className="flex items-baseline justify-between gap-3 border-b border-hair py-2">
            <dt className="font-bold">
              {row.label} <span className="font-normal">{row.unit}</span>
            </dt>
            <dd className="m-0 font-mono text-3xl font-semibold">
              {draft.asFound[row.name]?.trim() || (row.from === null ? 'not known' : row.fromText)}
            </dd>
          </div>
        ))}
      </dl>
      <p>{sheet.wayBack}</p>
      <div className="mt-3">
        <Button size="glove" onClick={onClose}>
          Back to the sheet
        </Button>
      </div>
    </div>
  );
}
