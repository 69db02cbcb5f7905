import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SetUpForm } from '@/components/forms/set-up-form';
import { needsSetUp } from '@/lib/auth/session';

export const metadata: Metadata = { title: 'Set up' };
export const dynamic = 'force-dynamic';

export default async function SetUpPage() {
  if (!(await needsSetUp())) redirect('/sign-in');
  return (
    <>
      <h1 className="mb-1 text-2xl">Set up Fettle</h1>
      <p className="mb-4 text-soft">The organisation, and you as its first person. This is asked once.</p>
      <SetUpForm />
    </>
  );
}
