import type { Transaction } from '../../../db/client';
import type { Scope } from '../../auth/scope';
import type { ChangeAction } from '../../change';
import { appUrl } from '../../env';
import { enqueue, peopleInRoles, personById, type Addressee } from '../../mail/outbox';
import { changeName, type AxisRow, type ChangeRow } from './content';

type Told = (tx: Transaction, scope: Scope, change: ChangeRow) => Promise<Addressee[]>;

const author: Told = async (tx, scope, change) =>
  change.authorId === scope.actor.id ? [] : personById(tx, scope, change.authorId);
const approvers: Told = (tx, scope) => peopleInRoles(tx, scope, ['approver']);
const technicians: Told = (tx, scope, change) =>
  change.technicianId ? personById(tx, scope, change.technicianId) : peopleInRoles(tx, scope, ['technician']);
const authorAndApprovers: Told = async (tx, scope, change) => {
  const people = [...(await author(tx, scope, change)), ...(await approvers(tx, scope, change))];
  return people.filter((person, index) => people.findIndex(({ id }) => id === person.id) === index);
};

/** Who hears of which step, and in what words. */
const LETTERS: Partial<Record<ChangeAction, { to: Told; words: string; page: 'changes' | 'sheet' }>> = {
  submit: { to: approvers, words: 'waits for your signature', page: 'changes' },
  return: { to: author, words: 'was returned to you', page: 'changes' },
  approve: { to: author, words: 'is approved and can be issued', page: 'changes' },
  issue: { to: technicians, words: 'is issued to you, to be entered at the machine', page: 'sheet' },
  apply: { to: authorAndApprovers, words: 'has been applied at the machine', page: 'changes' },
  verify: { to: authorAndApprovers, words: 'has been tested at the machine', page: 'changes' },
  'roll-back': { to: authorAndApprovers, words: 'was rolled back', page: 'changes' },
};

/** Puts the letters about a step into the outbox. */
export async function writeLetters(
  tx: Transaction,
  scope: Scope,
  action: ChangeAction,
  change: ChangeRow,
  axis: AxisRow,
  remark: string,
): Promise<void> {
  const letter = LETTERS[action];
  if (!letter) return;
  const number = changeName(change.number);
  const lines = [
    `${number}, ${axis.tag} ${axis.name}, ${letter.words}.`,
    '',
    `By: ${scope.actor.name}`,
    `Reason of the change: ${change.reason}`,
    ...(remark ? [`Remark: ${remark}`] : []),
    '',
    `${appUrl()}/${letter.page}/${change.id}`,
  ];
  await enqueue(tx, scope, await letter.to(tx, scope, change), {
    kind: `change-${action}`,
    subject: `${number} ${axis.tag} ${letter.words}`,
    body: lines.join('\n'),
  });
}
