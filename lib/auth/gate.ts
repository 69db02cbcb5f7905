import { redirect } from 'next/navigation';
import { currentSession, type Session } from './session';

/** The gate of every page behind the sign-in: nobody passes without a session. */
export async function requireSession(): Promise<Session> {
  const session = await currentSession();
  if (!session) redirect('/sign-in');
  return session;
}
