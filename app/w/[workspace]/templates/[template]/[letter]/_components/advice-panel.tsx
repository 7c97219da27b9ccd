'use client';

import { Disclosure } from '@/app/_components/disclosure';
import { formatNumber } from '@/app/_components/format-figure';
import { checkName } from '@/lib/review/check-words';
import type { RevisionView } from '@/lib/review/schemas';

type Advice = NonNullable<RevisionView['check']['advice']>[number];

/** The changes that buy most, each tried with all checks, and what limits the template's life; folded away at first. */
export function AdvicePanel({ check }: Pick<RevisionView, 'check'>) {
  const { advice = [], life } = check;
  if (advice.length === 0 && !life) return null;
  return (
    <div className="border-b border-rule">
      <Disclosure
        level={2}
        title={
          <span>
            What would help{' '}
            <span className="font-normal text-slate">
              changes of the recipe that were tried, and what wears first
            </span>
          </span>
        }
      >
        <div className="max-w-prose space-y-2 pb-3">
          {advice.length > 0 ? (
            <ol className="list-decimal space-y-1 pl-5">
              {advice.map((one) => (
                <li key={one.text}>
                  {one.text} <span className="text-slate">{boughtFor(one)}</span>
                </li>
              ))}
            </ol>
          ) : (
            <p>No change of the recipe that was tried mends a finding: the mesh is where to look.</p>
          )}
          {life ? <p>{life}</p> : null}
          <p className="text-sm text-slate">Estimates, to be proven by a test pull.</p>
        </div>
      </Disclosure>
    </div>
  );
}

/** What a change mends, and what it costs in printing: `Mends Skin; 0.3 h and 12 g more.` */
export function boughtFor({ mends, costS, costG }: Advice): string {
  const parts = [amount(costS / 3600, 1, 'h'), amount(costG, 0, 'g')].filter(Boolean).join(', ');
  return `Mends ${mends.map(checkName).join(', ')}; ${parts || 'printing stays as it is'}.`;
}

function amount(value: number, digits: number, unit: string): string {
  const text = formatNumber(Math.abs(value), digits);
  return Number(text) === 0 ? '' : `${text}\u00a0${unit} ${value > 0 ? 'more' : 'less'}`;
}
