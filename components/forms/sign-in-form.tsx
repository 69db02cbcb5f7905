'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { signInInput } from '@/lib/schemas/session';
import { Button } from '../ui/button';
import { TextField } from '../ui/field';
import { callApi, type Problem } from './api-client';
import { ProblemNotice } from './problem-notice';

type Values = z.input<typeof signInInput>;

export function SignInForm({ next }: { next: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState<Problem | null>(null);
  const { register, handleSubmit, formState } = useForm<Values>({ resolver: zodResolver(signInInput) });

  const submit = handleSubmit(async (values) => {
    setProblem(null);
    const answer = await callApi('POST', '/session', values);
    if (!answer.ok) return setProblem(answer.problem);
    router.replace(next);
    router.refresh();
  });

  return (
    <form onSubmit={submit} className="grid gap-4" noValidate>
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        autoFocus
        error={formState.errors.email?.message}
        {...register('email')}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="current-password"
        error={formState.errors.password?.message}
        {...register('password')}
      />
      {problem ? <ProblemNotice problem={problem} /> : null}
      <Button weight="primary" type="submit" disabled={formState.isSubmitting}>
        {formState.isSubmitting ? 'Signing in …' : 'Sign in'}
      </Button>
    </form>
  );
}
