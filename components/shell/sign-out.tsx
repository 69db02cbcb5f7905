'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { callApi } from '../forms/api-client';

export function SignOut() {
  const router = useRouter();
  return (
    <div className="-mx-2 mt-1 flex flex-wrap">
      <Link
        href="/account"
        className="flex min-h-9 items-center rounded px-2 underline underline-offset-4 hover:bg-petrol-wash"
      >
        Account
      </Link>
      <button
        type="button"
        className="min-h-9 cursor-pointer rounded px-2 underline underline-offset-4 hover:bg-petrol-wash"
        onClick={async () => {
          await callApi('DELETE', '/session');
          router.replace('/sign-in');
          router.refresh();
        }}
      >
        Sign out
      </button>
    </div>
  );
}
