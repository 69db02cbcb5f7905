'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import type { Role } from '@/lib/change';
import { tokenInput } from '@/lib/schemas/token';
import { Button } from '../ui/button';
import { SelectField, TextField } from '../ui/field';
import { Notice } from '../ui/notice';
import { callApi, type Problem } from './api-client';
import { ProblemNotice } from './problem-notice';

type Values = z.input<typeof tokenInput>;

/** Makes a token for the API; it is shown once. */
export function TokenForm({ roles }: { roles: readonly Role[] }) {
  const [problem, setProblem] = useState<Problem | null>(null);
  const [token, setToken] = useState<string | null>(null);
  const { register, handleSubmit, formState } = useForm<Values>({
    resolver: zodResolver(tokenInput),
    defaultValues: { role: roles[0], days: 90 },
  });
  const { errors, isSubmitting } = formState;
  const submit = handleSubmit(async (values) => {
    setProblem(null);
    const answer = await callApi<{ token: string }>('POST', '/tokens', values);
    if (!answer.ok) return setProblem(answer.problem);
    setToken(answer.value.token);
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-md gap-4 pt-4">
      <TextField label="What it is for" error={errors.name?.message} {...register('name')} />
      <SelectField label="Role" error={errors.role?.message} {...register('role')}>
        {roles.map((role) => (
          <option key={role} value={role}>
            {role}
          </option>
        ))}
      </SelectField>
      <TextField
        label="Valid for"
        unit="days"
        inputMode="numeric"
        error={errors.days?.message}
        {...register('days', { valueAsNumber: true })}
      />
      {problem ? <ProblemNotice problem={problem} /> : null}
      {token ? (
        <Notice tone="care" title="Copy it now; it is not shown again.">
          <code className="font-mono text-sm break-all">{token}</code>
        </Notice>
      ) : null}
      <div>
        <Button type="submit" disabled={isSubmitting}>
          Make a token
        </Button>
      </div>
    </form>
  );
}
