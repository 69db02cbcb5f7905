import type { ReactNode } from 'react';
import { formatNumber } from '@/lib/units';
import type { Plant } from '@/lib/control/types';

function Power({ exponent }: { exponent: number }): ReactNode {
  if (exponent === 0) return null;
  return (
    <>
      <i className="pl-0.5">s</i>
      {exponent > 1 ? <sup className="text-[0.7em]">{exponent}</sup> : null}
    </>
  );
}

function Terms({ coefficients }: { coefficients: readonly number[] }) {
  const order = coefficients.length - 1;
  const terms = coefficients
    .map((value, index) => ({ value, exponent: order - index }))
    .filter(({ value }) => value !== 0);
  if (terms.length === 0) return <>0</>;
  return terms.map(({ value, exponent }, index) => {
    const size = Math.abs(value);
    const sign = value < 0 ? '−' : '+';
    return (
      <span key={exponent} className="whitespace-nowrap">
        {index === 0 ? (value < 0 ? '−' : '') : ` ${sign} `}
        {size === 1 && exponent > 0 ? null : formatNumber(size, { significant: 6 })}
        <Power exponent={exponent} />
      </span>
    );
  });
}

/** The plant set back in type, so that a slip in the pasted text shows at once. */
export function PlantFormula({ plant, label }: { plant: Plant; label: string }) {
  const isGain = plant.den.length === 1 && plant.den[0] === 1;
  return (
    <div
      role="img"
      aria-label={label}
      className="flex items-center gap-2.5 overflow-x-auto border border-rule bg-sheet px-4 py-3.5 font-mono text-[16px]"
    >
      <span className="whitespace-nowrap">G(s) =</span>
      {isGain ? (
        <Terms coefficients={plant.num} />
      ) : (
        <span className="inline-grid text-center">
          <span className="border-b-[1.5px] border-ink px-2 pb-0.5 whitespace-nowrap">
            <Terms coefficients={plant.num} />
          </span>
          <span className="px-2 pt-0.5 whitespace-nowrap">
            <Terms coefficients={plant.den} />
          </span>
        </span>
      )}
      {plant.deadTimeS > 0 ? (
        <span className="whitespace-nowrap">
          · e
          <sup className="text-[0.75em]">
            −{formatNumber(plant.deadTimeS, { significant: 6 })} <i>s</i>
          </sup>
        </span>
      ) : null}
    </div>
  );
}
