import type { ReactNode } from 'react';

/** A numbered section of a worksheet. */
export function WorksheetSection({
  number,
  title,
  note,
  last,
  children,
}: {
  number: number;
  title: string;
  note?: ReactNode;
  last?: boolean;
  children: ReactNode;
}) {
  const id = `section-${number}`;
  return (
    <section
      aria-labelledby={id}
      className={`grid grid-cols-1 gap-y-2 py-5 sm:grid-cols-[34px_minmax(0,1fr)] ${last ? '' : 'border-b border-rule'}`}
    >
      <div
        className="hidden font-mono text-[19px] leading-tight font-semibold text-petrol sm:block"
        aria-hidden="true"
      >
        {number}
      </div>
      <div className="min-w-0">
        <header className="mb-2.5 flex flex-wrap items-baseline justify-between gap-x-4">
          <h2 id={id} className="text-lg">
            <span className="mr-2 font-mono text-petrol sm:hidden" aria-hidden="true">
              {number}
            </span>
            {title}
          </h2>
          {note ? <span className="text-sm text-soft">{note}</span> : null}
        </header>
        {children}
      </div>
    </section>
  );
}

/** Head of every page: the path to it, its name, and what can be done there. */
export function PageHead({ path, title, aside }: { path?: ReactNode; title: ReactNode; aside?: ReactNode }) {
  return (
    <header className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3 border-b-2 border-ink pb-3.5">
      <div className="min-w-0">
        {path ? <div className="text-sm text-soft">{path}</div> : null}
        <h1 className="text-2xl">{title}</h1>
      </div>
      {aside ? <div className="flex flex-wrap items-center gap-x-5 gap-y-2">{aside}</div> : null}
    </header>
  );
}
