'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { machineInput } from '@/lib/schemas/machine';
import { Button } from '../ui/button';
import { TextArea, TextField } from '../ui/field';
import { ProblemNotice } from './problem-notice';
import { useSend } from './use-send';

type Values = z.input<typeof machineInput>;

export interface EditedMachine {
  id: string;
  site: string;
  name: string;
  cautions: string;
  rowVersion: number;
}

export function MachineForm({ machine }: { machine?: EditedMachine }) {
  const { problem, send } = useSend();
  const { register, handleSubmit, formState } = useForm<Values>({
    resolver: zodResolver(machineInput),
    defaultValues: machine ?? { site: '', name: '', cautions: '' },
  });
  const { errors, isSubmitting } = formState;
  const submit = handleSubmit((values) =>
    machine
      ? send(
          'PATCH',
          `/machines/${machine.id}`,
          { ...values, rowVersion: machine.rowVersion },
          (id) => `/machines/${id}`,
        )
      : send('POST', '/machines', values, (id) => `/machines/${id}`),
  );
  return (
    <form onSubmit={submit} noValidate className="grid max-w-xl gap-4 pt-6">
      <TextField
        label="Site or area"
        hint="Where it stands."
        error={errors.site?.message}
        {...register('site')}
      />
      <TextField label="Machine" error={errors.name?.message} {...register('name')} />
      <TextArea
        label="Cautions of this machine"
        hint="One a line; they stand on every sheet, after the usual ones."
        rows={4}
        error={errors.cautions?.message}
        {...register('cautions')}
      />
      {problem ? <ProblemNotice problem={problem} /> : null}
      <div>
        <Button weight="primary" type="submit" disabled={isSubmitting}>
          {machine ? 'Save' : 'Add the machine'}
        </Button>
      </div>
    </form>
  );
}
