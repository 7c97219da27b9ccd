'use client';

import { Disclosure } from '@/app/_components/disclosure';
import { Figure } from '@/app/_components/figure';
import { MeasureBar } from '@/app/_components/measure-bar';
import { usePreferences } from '@/app/_components/preferences-context';
import { Time } from '@/app/_components/time';
import type { FindingView } from '@/lib/review/schemas';
import { checkName } from './check-names';
import { figureOf, measureOf } from './measure-of';
import { PlaceLinks } from './place-links';

const kinds: Record<string, string> = {
  'common practice': 'common practice',
  handbook: 'a handbook',
  standard: 'a standard',
  computed: 'computed from the recipe',
};

/** What a check says: measured against limit, what to change, where, and what the limit rests on. */
export function FindingCard({ finding, itemKey }: { finding: FindingView; itemKey: string }) {
  const { units } = usePreferences();
  const measure = measureOf(finding, units);
  return (
    <>
      {measure && finding.status !== 'pass' ? (
        <div className="pt-0.5 pb-1">
          <MeasureBar {...measure} />
        </div>
      ) : null}
      {finding.remedy ? <p>{finding.remedy}</p> : null}
      {finding.waiver ? (
        <p className="border-l-2 border-ochre pl-3 text-sm">
          Waived by <span className="font-medium">{finding.waiver.by}</span>,{' '}
          <Time at={finding.waiver.at} show="moment" />: “{finding.waiver.reason}”
        </p>
      ) : null}
      <PlaceLinks places={finding.places} itemKey={itemKey} />
    </>
  );
}

/** How a finding was computed and what its limit rests on. */
export function FindingBasis({ finding }: { finding: FindingView }) {
  const { units } = usePreferences();
  const shown = (value: number | null) =>
    value === null ? null : <Figure {...figureOf(value, finding.unit, units)} />;
  return (
    <Disclosure
      title={
        <span className="text-sm font-medium text-verdigris underline underline-offset-3">
          how it is computed
        </span>
      }
      level={4}
    >
      <dl className="grid grid-cols-[auto_1fr] gap-x-3 gap-y-0.5 text-sm">
        <dt className="text-slate">check</dt>
        <dd>{checkName(finding.checkId)}</dd>
        {finding.measured !== null ? (
          <>
            <dt className="text-slate">measured</dt>
            <dd>{shown(finding.measured)}</dd>
          </>
        ) : null}
        {finding.limit !== null ? (
          <>
            <dt className="text-slate">limit</dt>
            <dd>{shown(finding.limit)}</dd>
          </>
        ) : null}
        <dt className="text-slate">basis</dt>
        <dd>
          {finding.basis.source}
          {kinds[finding.basis.kind] && !finding.basis.source.startsWith(kinds[finding.basis.kind])
            ? ` (${kinds[finding.basis.kind]})`
            : ''}
        </dd>
      </dl>
    </Disclosure>
  );
}
