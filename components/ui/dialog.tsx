'use client';

import { Dialog as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

/** A sheet laid over the page for one question; closes with Escape, keeps the focus inside. */
export function Dialog({
  open,
  onOpenChange,
  title,
  description,
  children,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  description: string;
  children: ReactNode;
}) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <Primitive.Overlay className="fixed inset-0 z-40 bg-ink/40" />
        <Primitive.Content className="fixed top-1/2 left-1/2 z-50 max-h-[92vh] w-[min(620px,94vw)] -translate-x-1/2 -translate-y-1/2 overflow-y-auto rounded-lg border-[1.5px] border-ink bg-paper p-6 shadow-xl">
          <Primitive.Title className="text-lg font-bold">{title}</Primitive.Title>
          <Primitive.Description className="mt-1 mb-4 text-sm text-soft">{description}</Primitive.Description>
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
