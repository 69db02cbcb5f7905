'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { setUpInput } from '@/lib/schemas/session';
import { Button } from '../ui/button';
import { TextField } from '../ui/field';
import { callApi, type Problem } from './api-client';
import { ProblemNotice } from './problem-notice';

type Values = z.input<typeof setUpInput>;

export function SetUpForm() {
  const router = useRouter();
  const [problem, setProblem] = useState<Problem | null>(null);
  const { register, handleSubmit, formState } = useForm<Values>({ resolver: zodResolver(setUpInput) });
  const { errors, isSubmitting } = formState;
  const submit = handleSubmit(async (values) => {
    setProblem(null);
    const made = await callApi('POST', '/set-up', values);
    if (!made.ok) return setProblem(made.problem);
    const signedIn = await callApi('POST', '/session', { email: values.email, password: values.password });
    if (!signedIn.ok) return setProblem(signedIn.problem);
    router.replace('/');
    router.refresh();
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <TextField label="Organisation" error={errors.organisation?.message} {...register('organisation')} />
      <TextField
        label="Your name"
        hint="It stands on everything you sign."
        autoComplete="name"
        error={errors.name?.message}
        {...register('name')}
      />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        error={errors.email?.message}
        {...register('email')}
      />
      <TextField
        label="Password"
        hint="10 characters or more, at most 72 bytes."
        type="password"
        autoComplete="new-password"
        error={errors.password?.message}
        {...register('password')}
      />
      <label className="flex items-start gap-3">
        <input type="checkbox" className="mt-1 size-5 accent-petrol" {...register('onePersonShop')} />
        <span>
          One-person shop
          <span className="block text-xs text-soft">
            Author and approver may be the same person; every record then says so.
          </span>
        </span>
      </label>
      {problem ? <ProblemNotice problem={problem} /> : null}
      <Button weight="primary" type="submit" disabled={isSubmitting}>
        Set it up
      </Button>
    </form>
  );
}
