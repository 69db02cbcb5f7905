import type { Metadata } from 'next';
import { PasswordForm } from '@/components/forms/password-form';
import { TokenForm } from '@/components/forms/token-form';
import { PageHead } from '@/components/ui/section';
import { requireSession } from '@/lib/auth/gate';

export const metadata: Metadata = { title: 'Account' };

export default async function AccountPage() {
  const { person, roles, organisation } = await requireSession();
  return (
    <>
      <PageHead path={organisation.name} title={person.name} />
      <p className="pt-4 text-soft">
        {person.email}, {roles.join(', ')}
      </p>
      <h2 className="mt-6 text-lg">Change the password</h2>
      <p className="mt-1 text-soft">
        It ends every session of yours, this one too; sign in again with the new one.
      </p>
      <PasswordForm />
      <h2 className="mt-8 text-lg">Make a token for the API</h2>
      <p className="mt-1 text-soft">
        Send it as Authorization: Bearer. It can do what its one role can, for you.
      </p>
      <TokenForm roles={roles} />
    </>
  );
}
