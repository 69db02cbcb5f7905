import { Button } from '../ui/button';

function VersionSelect({
  name,
  label,
  versions,
  value,
}: {
  name: string;
  label: string;
  versions: readonly number[];
  value: number;
}) {
  return (
    <label className="flex items-center gap-2 text-sm">
      {label}
      <select
        name={name}
        defaultValue={value}
        className="figure min-h-10 rounded border border-edge bg-sheet px-2"
      >
        {versions.map((version) => (
          <option key={version} value={version}>
            v{version}
          </option>
        ))}
      </select>
    </label>
  );
}

/** Picks the two versions to lay side by side; a plain form, so that the address says what is compared. */
export function CompareForm({
  versions,
  from,
  to,
}: {
  versions: readonly number[];
  from: number;
  to: number;
}) {
  return (
    <form className="mb-3 flex flex-wrap items-center gap-4">
      <VersionSelect name="from" label="From" versions={versions} value={from} />
      <VersionSelect name="to" label="to" versions={versions} value={to} />
      <Button type="submit">Compare</Button>
    </form>
  );
}
