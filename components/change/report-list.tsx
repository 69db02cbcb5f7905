import type { DeviceRow } from '@/lib/control/forms';
import { formatNumber } from '@/lib/units';
import { minute } from '../ui/date';

export interface ReportRow {
  id: string;
  kind: 'apply' | 'verify' | 'roll-back';
  identity: { deviceLabel: string; slot?: string; firmware?: string } | null;
  asFound: Readonly<Record<string, number>> | null;
  asLeft: Readonly<Record<string, number>> | null;
  saved: string | null;
  remark: string;
  enteredByName: string;
  receivedAt: Date;
}

const TITLES = { apply: 'At the machine', verify: 'Verification', 'roll-back': 'Roll-back' };

function value(values: ReportRow['asFound'], name: string): string {
  const number = values?.[name];
  return number === undefined ? '–' : formatNumber(number, { significant: 7 });
}

/** What was found and left at the machine, beside what was prescribed. */
export function ReportList({ reports, rows }: { reports: readonly ReportRow[]; rows: readonly DeviceRow[] }) {
  return reports.map((report) => (
    <section key={report.id} className="mb-5" data-report={report.kind}>
      <h3 className="text-base">
        {TITLES[report.kind]}{' '}
        <span className="text-sm font-normal text-soft">
          {report.enteredByName}, {minute(report.receivedAt)}
        </span>
      </h3>
      {report.identity ? (
        <p className="text-sm">
          Device {report.identity.deviceLabel}
          {report.identity.slot ? `, slot ${report.identity.slot}` : ''}
          {report.identity.firmware ? `, firmware ${report.identity.firmware}` : ''}
          {report.saved === 'yes' ? '. Saved in the device.' : report.saved ? '. Saving not applicable.' : ''}
        </p>
      ) : null}
      {report.asLeft ? (
        <div className="overflow-x-auto">
          <table className="ledger mt-1 text-sm">
            <thead>
              <tr>
                <th scope="col">Parameter</th>
                <th scope="col" className="right">
                  As found
                </th>
                <th scope="col" className="right">
                  As left
                </th>
                <th scope="col">Unit</th>
              </tr>
            </thead>
            <tbody>
              {rows.map((row) => (
                <tr key={row.name}>
                  <td>{row.label}</td>
                  <td className="right font-mono">{value(report.asFound, row.name)}</td>
                  <td className="right font-mono font-semibold">{value(report.asLeft, row.name)}</td>
                  <td>{row.unit || '–'}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      ) : null}
      {report.remark ? <p className="mt-1 text-sm whitespace-pre-line">{report.remark}</p> : null}
    </section>
  ));
}
