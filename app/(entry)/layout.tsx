import type { ReactNode } from 'react';
import { Mark } from '@/components/shell/mark';

export default function EntryLayout({ children }: { children: ReactNode }) {
  return (
    <main className="mx-auto grid min-h-screen w-full max-w-[440px] content-center px-5 py-10">
      <div className="mb-6">
        <Mark />
        <p className="mt-1 text-sm text-soft">
          Controller gains: worked out, checked, signed and carried to the machine.
        </p>
      </div>
      {children}
    </main>
  );
}
