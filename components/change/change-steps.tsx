'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { ChangeAction } from '@/lib/change';
import { callApi, type Problem } from '../forms/api-client';
import { ProblemNotice } from '../forms/problem-notice';
import { Button, buttonClass } from '../ui/button';
import { SelectField, TextArea, TextField } from '../ui/field';

export interface StepPerson {
  id: string;
  name: string;
}

interface Props {
  changeId: string;
  /** The steps that this person may take now. */
  actions: readonly ChangeAction[];
  /** What the signature under the approval means. */
  approvalMeaning: string;
  technicians: readonly StepPerson[];
}

type Send = (step: string, body: unknown) => Promise<void>;

function Approve({ meaning, busy, send }: { meaning: string; busy: boolean; send: Send }) {
  const [password, setPassword] = useState('');
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        void send('approve', { password });
      }}
    >
      <p className="border-l-[5px] border-petrol bg-petrol-wash px-3.5 py-2.5">
        Your signature says: <strong>“{meaning}”</strong>
      </p>
      <TextField
        label="Your password, to sign"
        type="password"
        autoComplete="current-password"
        required
        value={password}
        onChange={(event) => setPassword(event.target.value)}
      />
      <div>
        <Button weight="primary" type="submit" disabled={busy || password === ''}>
          Sign and approve
        </Button>
      </div>
    </form>
  );
}

function WithRemark({
  step,
  label,
  button,
  busy,
  send,
}: {
  step: string;
  label: string;
  button: string;
  busy: boolean;
  send: Send;
}) {
  const [remark, setRemark] = useState('');
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        void send(step, { remark });
      }}
    >
      <TextArea
        label={label}
        rows={2}
        required
        value={remark}
        onChange={(event) => setRemark(event.target.value)}
      />
      <div>
        <Button type="submit" disabled={busy || remark.trim() === ''}>
          {button}
        </Button>
      </div>
    </form>
  );
}

function Issue({
  technicians,
  busy,
  send,
}: {
  technicians: readonly StepPerson[];
  busy: boolean;
  send: Send;
}) {
  const [technicianId, setTechnicianId] = useState('');
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        void send('issue', technicianId ? { technicianId } : {});
      }}
    >
      <SelectField
        label="Issue to"
        value={technicianId}
        onChange={(event) => setTechnicianId(event.target.value)}
      >
        <option value="">any technician</option>
        {technicians.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      <div>
        <Button weight="primary" type="submit" disabled={busy}>
          Issue to the machine
        </Button>
      </div>
    </form>
  );
}

function Verify({ busy, send }: { busy: boolean; send: Send }) {
  const [remark, setRemark] = useState('');
  return (
    <div className="grid gap-3">
      <TextArea
        label="What the test showed"
        rows={2}
        value={remark}
        onChange={(event) => setRemark(event.target.value)}
      />
      <div className="flex flex-wrap gap-3">
        <Button
          weight="primary"
          disabled={busy}
          onClick={() => void send('verify', { result: 'pass', remark })}
        >
          Test passed
        </Button>
        <Button
          weight="danger"
          disabled={busy}
          onClick={() => void send('verify', { result: 'fail', remark })}
        >
          Test failed
        </Button>
      </div>
    </div>
  );
}

/** What this person can do with the change now; each step is refused by the server too when it isn't theirs. */
export function ChangeSteps({ changeId, actions, approvalMeaning, technicians }: Props) {
  const router = useRouter();
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const may = (action: ChangeAction) => actions.includes(action);
  const send: Send = async (step, body) => {
    setBusy(true);
    setProblem(null);
    const answer = await callApi('POST', `/changes/${changeId}/${step}`, body);
    setBusy(false);
    if (!answer.ok) return setProblem(answer.problem);
    router.refresh();
  };
  if (actions.length === 0) return <p className="text-soft">Nothing for you to do on this change now.</p>;
  return (
    <div className="grid gap-6">
      {problem ? <ProblemNotice problem={problem} /> : null}
      {may('submit') ? (
        <div>
          <Button weight="primary" disabled={busy} onClick={() => void send('submit', {})}>
            Submit for signature
          </Button>
        </div>
      ) : null}
      {may('approve') ? <Approve meaning={approvalMeaning} busy={busy} send={send} /> : null}
      {may('return') ? (
        <WithRemark step="return" label="Remark to the author" button="Return it" busy={busy} send={send} />
      ) : null}
      {may('issue') ? <Issue technicians={technicians} busy={busy} send={send} /> : null}
      {may('apply') ? (
        <div>
          <Link className={buttonClass('primary')} href={`/sheet/${changeId}`}>
            Open the sheet
          </Link>
        </div>
      ) : null}
      {may('verify') ? <Verify busy={busy} send={send} /> : null}
      {may('roll-back') ? (
        <div>
          <Link className={buttonClass('danger')} href={`/sheet/${changeId}?back`}>
            Roll back …
          </Link>
        </div>
      ) : null}
      {may('withdraw') ? (
        <WithRemark
          step="withdraw"
          label="Why it is withdrawn"
          button="Withdraw it"
          busy={busy}
          send={send}
        />
      ) : null}
    </div>
  );
}
