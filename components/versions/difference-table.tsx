import type { DeviceRow } from '@/lib/control/forms';
import type { Actuator, IdealController, Plant } from '@/lib/control/types';
import { diffValues } from '@/lib/change';
import type { Requirement } from '@/lib/requirement';
import { formatNumber } from '@/lib/units';

/** All of a version that bears on its gains. */
interface Version {
  version: number;
  deviceRows: readonly DeviceRow[];
  controller: IdealController;
  loadCases: readonly { name: string; plant: Plant & { text: string } }[];
  requirement: Requirement;
  rule: string | null;
  settings: Readonly<Record<string, unknown>> | null;
  actuator: Actuator;
  sampleTimeS: number | null;
  reason: string;
}

function comparable(version: Version) {
  const { deviceRows, controller, loadCases, requirement, rule, settings, actuator, sampleTimeS, reason } =
    version;
  return {
    'device gains': Object.fromEntries(
      deviceRows.map(({ label, unit, text }) => [`${label}${unit ? `, ${unit}` : ''}`, text]),
    ),
    'ideal form': { ...controller },
    plant: Object.fromEntries(loadCases.map(({ name, plant }) => [name, plant.text])),
    requirement: { ...requirement },
    rule: rule ?? 'typed by hand',
    settings: settings ?? {},
    actuator: { ...actuator },
    'sample time': sampleTimeS ?? 'continuous',
    reason,
  };
}

function shown(value: unknown): string {
  if (value === undefined || value === null) return '–';
  if (typeof value === 'number') return formatNumber(value, { significant: 6 });
  return typeof value === 'string' ? value : JSON.stringify(value);
}

/** Every value that is not the same in two versions. */
export function DifferenceTable({ from, to }: { from: Version; to: Version }) {
  const differences = diffValues(comparable(from), comparable(to));
  if (differences.length === 0)
    return <p className="text-soft">These two versions are the same in everything.</p>;
  return (
    <div className="overflow-x-auto">
      <table className="ledger text-sm" data-differences>
        <thead>
          <tr>
            <th scope="col">What</th>
            <th scope="col">v{from.version}</th>
            <th scope="col">v{to.version}</th>
          </tr>
        </thead>
        <tbody>
          {differences.map(({ path, from: before, to: after }) => (
            <tr key={path}>
              <td>{path.replaceAll('.', ' · ')}</td>
              <td className="font-mono break-words">{shown(before)}</td>
              <td className="font-mono font-semibold break-words">{shown(after)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
