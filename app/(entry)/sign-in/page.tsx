import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInForm } from '@/components/forms/sign-in-form';
import { currentSession, needsSetUp } from '@/lib/auth/session';

export const metadata: Metadata = { title: 'Sign in' };
export const dynamic = 'force-dynamic';

/** Only a path of this site is followed after signing in. */
function safePath(next: string | undefined): string {
  return next?.startsWith('/') && !next.startsWith('//') && !next.includes('\\') ? next : '/';
}

export default async function SignInPage({ searchParams }: { searchParams: Promise<{ next?: string }> }) {
  const next = safePath((await searchParams).next);
  if (await needsSetUp()) redirect('/set-up');
  if (await currentSession()) redirect(next);
  return (
    <>
      <h1 className="mb-4 text-2xl">Sign in</h1>
      <SignInForm next={next} />
    </>
  );
}
