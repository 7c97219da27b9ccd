'use client';

import { useId, useState, type ReactNode } from 'react';
import { Figure } from '@/app/_components/figure';
import { MeasureBar } from '@/app/_components/measure-bar';
import { usePreferences } from '@/app/_components/preferences-context';
import { Time } from '@/app/_components/time';
import { checkComputed, checkName } from '@/lib/review/check-words';
import type { FindingView } from '@/lib/review/schemas';
import { basisWords } from './basis-words';
import { figureOf, measureOf, pairWords } from './measure-of';
import { MetaButton } from './meta-button';
import { PlaceLinks } from './place-links';

/** What a check says: measured against limit, what to change, where, and what the limit rests on. */
export function FindingCard(props: { finding: FindingView; itemKey: string; actions: ReactNode }) {
  const { finding, itemKey, actions } = props;
  const { units } = usePreferences();
  const [explained, setExplained] = useState(false);
  const basisId = useId();
  const wasRun = finding.status !== 'not-run';
  const isBreach = finding.status === 'fail' || finding.status === 'caution';
  const measure = isBreach ? measureOf(finding, units) : null;
  const pair = measure ? null : pairWords(finding, units);
  return (
    <>
      {measure ? <MeasureBar {...measure} /> : null}
      {pair ? <p className="font-mono text-xs text-slate">{pair}</p> : null}
      {finding.remedy ? <p>{finding.remedy}</p> : null}
      {finding.waiver ? (
        <p className="border-l-2 border-ochre pl-3 text-sm">
          Waived by <span className="font-medium">{finding.waiver.by}</span>,{' '}
          <Time at={finding.waiver.at} show="moment" />: “{finding.waiver.reason}”
        </p>
      ) : null}
      <div className="flex flex-wrap items-baseline gap-x-3.5 text-sm text-slate">
        {finding.places.length > 0 ? (
          <PlaceLinks places={finding.places} itemKey={itemKey} />
        ) : isBreach ? (
          <span>concerns the whole template</span>
        ) : null}
        {wasRun ? (
          <MetaButton
            aria-expanded={explained}
            aria-controls={basisId}
            onPress={() => setExplained(!explained)}
          >
            how it is computed
          </MetaButton>
        ) : null}
        {actions}
      </div>
      {wasRun ? (
        <div id={basisId} hidden={!explained} className="print:block">
          <FindingBasis finding={finding} />
        </div>
      ) : null}
    </>
  );
}

function FindingBasis({ finding }: { finding: FindingView }) {
  const { units } = usePreferences();
  const rows: [string, ReactNode][] = [['check', checkName(finding.checkId)]];
  const computed = checkComputed(finding.checkId);
  if (computed) rows.push(['from', computed]);
  if (finding.measured !== null) {
    rows.push(['measured', <Figure key="m" {...figureOf(finding.measured, finding.unit, units)} />]);
  }
  if (finding.limit !== null) {
    rows.push(['limit', <Figure key="l" {...figureOf(finding.limit, finding.unit, units)} />]);
  }
  rows.push(['basis', basisWords(finding.basis)]);
  return (
    <dl className="my-1 grid grid-cols-[auto_1fr] gap-x-4 gap-y-0.5 border-l-2 border-rule pl-3 text-sm">
      {rows.map(([label, value]) => (
        <div key={label} className="contents">
          <dt className="text-slate">{label}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  );
}
