import type { ReactNode } from 'react';

export type Tone = 'good' | 'bad' | 'care' | 'plain';

const TONES: Record<Tone, { box: string; word: string; sign: string }> = {
  good: { box: 'bg-moss-wash border-moss', word: 'text-moss', sign: '✓' },
  bad: { box: 'bg-brick-wash border-brick', word: 'text-brick', sign: '✕' },
  care: { box: 'bg-ochre-wash border-ochre', word: 'text-ochre', sign: '!' },
  plain: { box: 'bg-petrol-wash border-petrol', word: 'text-petrol', sign: '·' },
};

/** A statement with a word, a sign and a colour, so that the colour alone never tells it. */
export function Notice({
  tone,
  title,
  children,
  live,
}: {
  tone: Tone;
  title: ReactNode;
  children?: ReactNode;
  live?: boolean;
}) {
  const look = TONES[tone];
  return (
    <div
      className={`flex flex-wrap items-baseline gap-x-3 gap-y-1 border-l-[5px] px-3.5 py-2.5 ${look.box}`}
      role={live ? 'status' : undefined}
    >
      <strong className={`font-bold ${look.word}`}>
        <span aria-hidden="true">{look.sign} </span>
        {title}
      </strong>
      {children ? <span>{children}</span> : null}
    </div>
  );
}

/** A short word with a border: a state, a kind. */
export function Tag({ tone, children }: { tone: Tone; children: ReactNode }) {
  return (
    <span
      className={`rounded-sm border border-current px-2 py-0.5 text-xs font-semibold whitespace-nowrap ${TONES[tone].word}`}
    >
      {children}
    </span>
  );
}
