'use client';

import { Menu, X } from 'lucide-react';
import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { useState, type ReactNode } from 'react';
import { Mark } from './mark';
import { ThemeSwitch } from './theme-switch';

export interface SpineLink {
  href: string;
  label: string;
  /** A small count or sign at the end of the line, with the words it stands for. */
  end?: { text: string; words: string; tone?: 'good' | 'bad' | 'soft' };
}

export interface SpineGroup {
  title?: string;
  links: SpineLink[];
}

const END_TONES = { good: 'text-moss', bad: 'text-brick font-semibold', soft: 'text-soft' };

function Line({ link, here }: { link: SpineLink; here: boolean }) {
  return (
    <Link
      href={link.href}
      aria-current={here ? 'page' : undefined}
      className={`flex min-h-9 items-center justify-between gap-2 rounded px-2 py-1 no-underline hover:bg-petrol-wash ${here ? 'bg-petrol-wash font-semibold' : ''}`}
    >
      <span className="min-w-0 truncate">{link.label}</span>
      {link.end ? (
        <span className={`figure shrink-0 text-sm ${END_TONES[link.end.tone ?? 'soft']}`}>
          <span aria-hidden="true">{link.end.text}</span>
          <span className="sr-only">{link.end.words}</span>
        </span>
      ) : null}
    </Link>
  );
}

/** The side of the page: where one can go, and what waits there. Folds away on a phone. */
export function Spine({ groups, foot }: { groups: SpineGroup[]; foot: ReactNode }) {
  const pathname = usePathname();
  const [openAt, setOpenAt] = useState<string | null>(null);
  const open = openAt === pathname;
  return (
    <nav
      aria-label="Main"
      className="border-b border-rule px-4 py-3 lg:sticky lg:top-0 lg:h-screen lg:overflow-y-auto lg:border-r lg:border-b-0 lg:px-4 lg:py-5"
    >
      <div className="flex items-center justify-between lg:mb-5 lg:px-2">
        <Link href="/" className="no-underline" aria-label="Fettle, to the board">
          <Mark />
        </Link>
        <button
          type="button"
          className="flex size-12 items-center justify-center rounded lg:hidden"
          aria-expanded={open}
          aria-controls="spine-links"
          onClick={() => setOpenAt(open ? null : pathname)}
        >
          {open ? <X aria-hidden="true" /> : <Menu aria-hidden="true" />}
          <span className="sr-only">{open ? 'Close the menu' : 'Open the menu'}</span>
        </button>
      </div>
      <div id="spine-links" className={`${open ? 'block' : 'hidden'} pt-3 lg:block lg:pt-0`}>
        {groups.map((group, index) => (
          <div key={group.title ?? index} className="mb-4">
            {group.title ? (
              <p className="mx-2 mt-4 mb-1 text-xs font-semibold text-soft">{group.title}</p>
            ) : null}
            {group.links.map((link) => (
              <Line
                key={link.href}
                link={link}
                here={
                  link.href === '/'
                    ? pathname === '/'
                    : pathname === link.href || pathname.startsWith(`${link.href}/`)
                }
              />
            ))}
          </div>
        ))}
        <div className="mt-6 grid gap-1 border-t border-rule pt-3">
          <ThemeSwitch />
          {foot}
        </div>
      </div>
    </nav>
  );
}
