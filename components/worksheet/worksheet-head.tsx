'use client';

import Link from 'next/link';
import { formatNumber, formatTimeS } from '@/lib/units';
import { Button } from '../ui/button';
import { PageHead } from '../ui/section';
import type { WorksheetAxis } from './types';

function limits({ low, high }: WorksheetAxis['actuator'], unit: string): string | null {
  if (low === undefined && high === undefined) return null;
  if (low !== undefined && high !== undefined && low === -high)
    return `limits ±${formatNumber(high)} ${unit}`;
  const end = (value: number | undefined) => (value === undefined ? 'none' : formatNumber(value));
  return `limits ${end(low)} to ${end(high)} ${unit}`;
}

export function WorksheetHead({
  axis,
  canKeep,
  canHandOver,
  onKeep,
  onHandOver,
}: {
  axis: WorksheetAxis;
  canKeep: boolean;
  canHandOver: boolean;
  onKeep: () => void;
  onHandOver: () => void;
}) {
  const facts = [
    `${axis.units.output} → ${axis.units.input}`,
    limits(axis.actuator, axis.units.output),
    axis.sampleTimeS ? `sampled every ${formatTimeS(axis.sampleTimeS)}` : null,
  ].filter(Boolean);
  return (
    <PageHead
      path={
        <>
          <Link className="link" href={`/machines/${axis.machine.id}`}>
            {axis.machine.name}
          </Link>{' '}
          / {axis.tag}
        </>
      }
      title={axis.name}
      aside={
        <>
          <div className="text-sm md:text-right">
            <div>
              {axis.inService ? (
                <>
                  In service: <strong>v{axis.inService.version}</strong>, since {axis.inService.since}
                </>
              ) : (
                'No version in service yet'
              )}
            </div>
            <div className="text-soft">
              {facts.join(' · ')}{' '}
              <Link className="link" href={`/axes/${axis.id}/edit`}>
                edit
              </Link>
            </div>
          </div>
          {axis.may.keep ? (
            <Button onClick={onKeep} disabled={!canKeep}>
              Keep as v{axis.lastVersion + 1}
            </Button>
          ) : null}
          {axis.may.handOver ? (
            <Button weight="primary" onClick={onHandOver} disabled={!canHandOver}>
              Hand over …
            </Button>
          ) : null}
        </>
      }
    />
  );
}
