import Link from 'next/link';
import { day } from '../ui/date';

export interface AxisRow {
  id: string;
  tag: string;
  name: string;
  lastVersion: number;
  inService: { version: number; since: Date | null } | null;
  pass: boolean | null;
  held: number;
  limits: number;
}

function Requirement({ axis }: { axis: AxisRow }) {
  if (!axis.inService) return <span className="text-soft">–</span>;
  if (axis.pass === null) return <span className="text-soft">none stated</span>;
  return (
    <span className={`font-medium ${axis.pass ? 'text-moss' : 'text-brick'}`}>
      <span aria-hidden="true">{axis.pass ? '✓ ' : '✕ '}</span>
      {axis.held} of {axis.limits} held
    </span>
  );
}

/** Every axis with what runs in it and whether that meets the requirement. */
export function AxisTable({ axes }: { axes: readonly AxisRow[] }) {
  if (axes.length === 0) return <p className="text-soft">No axis yet. Add a machine first, then its axes.</p>;
  return (
    <div className="overflow-x-auto">
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col">Tag</th>
            <th scope="col">Axis</th>
            <th scope="col" className="right">
              Kept
            </th>
            <th scope="col" className="right">
              In service
            </th>
            <th scope="col">Since</th>
            <th scope="col">Requirement</th>
          </tr>
        </thead>
        <tbody>
          {axes.map((axis) => (
            <tr key={axis.id}>
              <td className="figure whitespace-nowrap">
                <Link className="link" href={`/axes/${axis.id}`}>
                  {axis.tag}
                </Link>
              </td>
              <td>{axis.name}</td>
              <td className="figure right">{axis.lastVersion > 0 ? `v${axis.lastVersion}` : '–'}</td>
              <td className="figure right">{axis.inService ? `v${axis.inService.version}` : '–'}</td>
              <td className="figure whitespace-nowrap">
                {axis.inService?.since ? day(axis.inService.since) : '–'}
              </td>
              <td className="whitespace-nowrap">
                <Requirement axis={axis} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
