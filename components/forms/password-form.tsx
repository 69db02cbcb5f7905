'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { changePasswordInput } from '@/lib/schemas/session';
import { Button } from '../ui/button';
import { TextField } from '../ui/field';
import { callApi, type Problem } from './api-client';
import { ProblemNotice } from './problem-notice';

type Values = z.input<typeof changePasswordInput>;

export function PasswordForm() {
  const router = useRouter();
  const [problem, setProblem] = useState<Problem | null>(null);
  const { register, handleSubmit, formState } = useForm<Values>({
    resolver: zodResolver(changePasswordInput),
  });
  const { errors, isSubmitting } = formState;
  const submit = handleSubmit(async (values) => {
    setProblem(null);
    const answer = await callApi('POST', '/session/password', values);
    if (!answer.ok) return setProblem(answer.problem);
    router.replace('/sign-in');
    router.refresh();
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-md gap-4 pt-4">
      <TextField
        label="Present password"
        type="password"
        autoComplete="current-password"
        error={errors.current?.message}
        {...register('current')}
      />
      <TextField
        label="New password"
        hint="10 characters or more, at most 72 bytes."
        type="password"
        autoComplete="new-password"
        error={errors.next?.message}
        {...register('next')}
      />
      {problem ? <ProblemNotice problem={problem} /> : null}
      <div>
        <Button weight="primary" type="submit" disabled={isSubmitting}>
          Change it
        </Button>
      </div>
    </form>
  );
}
