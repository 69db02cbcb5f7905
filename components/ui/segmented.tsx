'use client';

export interface Choice<T extends string> {
  value: T;
  label: string;
  /** Why this one can't be taken; shown as its title. */
  unavailable?: string;
}

/** A row of exclusive choices; a radio group to the keyboard and to a screen reader. */
export function Segmented<T extends string>({
  name,
  label,
  choices,
  value,
  onChange,
}: {
  name: string;
  label: string;
  choices: readonly Choice<T>[];
  value: T;
  onChange: (value: T) => void;
}) {
  return (
    <fieldset className="inline-flex max-w-full flex-wrap overflow-hidden rounded border-[1.5px] border-ink bg-sheet">
      <legend className="sr-only">{label}</legend>
      {choices.map((choice) => (
        <label
          key={choice.value}
          title={choice.unavailable}
          className="flex min-h-10 min-w-12 cursor-pointer items-center justify-center border-r border-rule px-3 last:border-r-0 has-checked:bg-ink has-checked:font-semibold has-checked:text-sheet has-disabled:cursor-not-allowed has-disabled:text-soft has-disabled:line-through has-focus-visible:outline-3 has-focus-visible:-outline-offset-3 has-focus-visible:outline-petrol"
        >
          <input
            type="radio"
            className="sr-only"
            name={name}
            value={choice.value}
            checked={value === choice.value}
            disabled={choice.unavailable !== undefined}
            onChange={() => onChange(choice.value)}
          />
          {choice.label}
        </label>
      ))}
    </fieldset>
  );
}
