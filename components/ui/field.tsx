import {
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from 'react';

const BOX =
  'w-full rounded border bg-sheet text-ink px-3 py-1.5 min-h-10 aria-invalid:border-brick aria-invalid:border-2 border-edge';

export interface FieldNotes {
  label: ReactNode;
  /** One line under the field: unit, range, what it is for. */
  hint?: ReactNode;
  /** What is wrong and what would be right. */
  error?: ReactNode;
}

function Frame({ id, label, hint, error, children }: FieldNotes & { id: string; children: ReactNode }) {
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="text-sm font-semibold">
        {label}
      </label>
      {children}
      {hint && !error ? (
        <p id={`${id}-hint`} className="text-xs text-soft">
          {hint}
        </p>
      ) : null}
      {error ? (
        <p id={`${id}-error`} role="alert" className="text-sm font-semibold text-brick">
          ✕ {error}
        </p>
      ) : null}
    </div>
  );
}

function describedBy(id: string, { hint, error }: FieldNotes): string | undefined {
  if (error) return `${id}-error`;
  return hint ? `${id}-hint` : undefined;
}

export function TextField({
  label,
  hint,
  error,
  unit,
  className = '',
  ...rest
}: FieldNotes & { unit?: string } & InputHTMLAttributes<HTMLInputElement>) {
  const id = useId();
  const input = (
    <input
      id={id}
      aria-invalid={error ? true : undefined}
      aria-describedby={describedBy(id, { label, hint, error })}
      className={`${BOX} ${className}`}
      {...rest}
    />
  );
  return (
    <Frame id={id} label={label} hint={hint} error={error}>
      {unit ? (
        <div className="flex items-center gap-2">
          {input}
          <span className="shrink-0 text-sm text-soft">{unit}</span>
        </div>
      ) : (
        input
      )}
    </Frame>
  );
}

export function TextArea({
  label,
  hint,
  error,
  className = '',
  ...rest
}: FieldNotes & TextareaHTMLAttributes<HTMLTextAreaElement>) {
  const id = useId();
  return (
    <Frame id={id} label={label} hint={hint} error={error}>
      <textarea
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, { label, hint, error })}
        className={`${BOX} ${className}`}
        {...rest}
      />
    </Frame>
  );
}

export function SelectField({
  label,
  hint,
  error,
  className = '',
  children,
  ...rest
}: FieldNotes & SelectHTMLAttributes<HTMLSelectElement>) {
  const id = useId();
  return (
    <Frame id={id} label={label} hint={hint} error={error}>
      <select
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, { label, hint, error })}
        className={`${BOX} ${className}`}
        {...rest}
      >
        {children}
      </select>
    </Frame>
  );
}
