import type { Metadata } from 'next';
import { PageHead } from '@/components/ui/section';
import { listPeople } from '@/db/queries/people';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { PERMISSIONS } from '@/lib/auth/permissions';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage() {
  const { scope, organisation } = await requireSession();
  const people = await withScope(scope, (tx) => listPeople(tx, scope));
  return (
    <>
      <PageHead path={organisation.name} title="People" />
      <div className="overflow-x-auto pt-5">
        <table className="ledger">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">E-mail</th>
              <th scope="col">Roles</th>
            </tr>
          </thead>
          <tbody>
            {people.map(({ id, name, email, roles }) => (
              <tr key={id}>
                <td>{name}</td>
                <td>{email}</td>
                <td>{roles.join(', ')}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <h2 className="mt-8 mb-1 text-lg">Who may do what</h2>
      <p className="mb-2 text-soft">
        Everyone in the organisation can read.{' '}
        {organisation.onePersonShop
          ? 'This is a one-person shop: author and approver may be the same, and every record says so.'
          : 'Nobody approves a change of their own.'}
      </p>
      <ul className="list-disc pl-5">
        {Object.entries(PERMISSIONS).map(([verb, { sentence, roles }]) => (
          <li key={verb}>
            {sentence}: {roles.join(', ')}
          </li>
        ))}
      </ul>
    </>
  );
}
