import type { ChangeLine, ChangeRecord } from '../../db/queries/changes';
import { CAUTIONS } from '../change';
import { changeName } from '../services/changes/content';

export function changeLineAnswer(line: ChangeLine) {
  const { id, number, state, axisId, tag, fromVersion, toVersion, reason, authorName, changedAt } = line;
  return {
    id,
    number: changeName(number),
    state,
    axisId,
    tag,
    from: fromVersion === null ? null : { version: fromVersion },
    to: { version: toVersion },
    reason,
    author: authorName,
    changedAt,
  };
}

export function changeAnswer({ change, from, to, events, reports }: ChangeRecord) {
  const {
    id,
    number,
    state,
    axisId,
    reason,
    risk,
    test,
    wayBack,
    temporaryUntil,
    safetyFunction,
    siteReference,
  } = change;
  return {
    id,
    number: changeName(number),
    state,
    axisId,
    from: from && { id: from.id, version: from.version },
    to: { id: to.id, version: to.version },
    reason,
    risk,
    test,
    wayBack,
    temporaryUntil,
    safetyFunction,
    siteReference,
    author: { id: change.authorId, name: change.authorName },
    technicianId: change.technicianId,
    rowVersion: change.rowVersion,
    hash: change.contentHash,
    events: events.map((event) => ({
      action: event.action,
      by: { id: event.byId, name: event.byName, role: event.byRole },
      at: event.at,
      ...(event.meaning ? { meaning: event.meaning } : {}),
      ...(event.remark ? { remark: event.remark } : {}),
      hash: event.hash,
      previousHash: event.previousHash,
    })),
    reports: reports.map(({ kind, identity, asFound, asLeft, saved, remark, enteredByName, receivedAt }) => ({
      kind,
      identity,
      asFound,
      asLeft,
      saved,
      remark,
      by: enteredByName,
      at: receivedAt,
    })),
  };
}

/** The cautions of a sheet: the usual ones, and those of the machine. */
export function cautionsOf({ machine }: Pick<ChangeRecord, 'machine'>): string[] {
  const own = machine.cautions.split('\n').map((line) => line.trim());
  return [...CAUTIONS.map(({ text }) => text), ...own.filter(Boolean)];
}

/** The technician's sheet: rows in the device's order, form and unit. */
export function sheetAnswer(record: ChangeRecord) {
  const { change, from, to } = record;
  return {
    rows: to.deviceRows.map(({ name, label, unit, value, off }) => ({
      name,
      label,
      unit,
      from: from?.deviceRows.find((row) => row.name === name)?.value ?? null,
      to: value,
      ...(off === undefined ? {} : { off }),
    })),
    cautions: cautionsOf(record),
    test: change.test,
    wayBack: change.wayBack,
    validUntil: change.temporaryUntil,
  };
}
