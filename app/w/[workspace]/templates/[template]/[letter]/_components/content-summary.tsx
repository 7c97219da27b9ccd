'use client';

import type { ReactNode } from 'react';
import { Digest } from '@/app/_components/digest';
import { formatBytes } from '@/app/_components/format-figure';
import { StatusWord, type State } from '@/app/_components/status-word';
import { checkName } from '@/lib/review/check-words';
import type { ContentView } from '@/lib/review/schemas';
import { verdictWords } from '@/lib/review/verdict-words';
import { RecipeList } from './recipe-list';

type Summary = ContentView['summary'];

const verdictOf = ({ verdict, findings }: Summary): string =>
  verdict === null
    ? 'The check has not finished.'
    : verdictWords(findings.map(({ status, waived }) => ({ status, waived: waived !== null })));

const findingState: Record<string, State> = {
  fail: 'must-settle',
  caution: 'look-at',
  pass: 'passed',
};

/** Exactly what a signer puts their name to: nothing that is signed is left out, nothing else is in it. */
export function ContentSummary({ content }: { content: ContentView }) {
  const { summary, digest } = content;
  return (
    <dl className="flex flex-col divide-y divide-rule border-y border-rule">
      <Row label="Revision">{summary.revision}</Row>
      <Row label="Mesh">
        <span className="wrap-anywhere">{summary.meshFile}</span>, {formatBytes(summary.meshBytes)}
        <span className="block text-sm text-slate">
          SHA-256 <Digest value={summary.meshSha256} characters="all" className="ml-1" />
        </span>
      </Row>
      <Row label="Recipe">
        <RecipeList lines={summary.recipe} />
      </Row>
      <Row label="Verdict">{verdictOf(summary)}</Row>
      <Row label="Findings">
        <Findings findings={summary.findings} />
      </Row>
      <Row label="Open items">
        {summary.openItems.length === 0 ? (
          'None.'
        ) : (
          <ul className="list-disc pl-4">
            {summary.openItems.map((item, index) => (
              <li key={index}>{item}</li>
            ))}
          </ul>
        )}
      </Row>
      <Row label="Gate plan">{summary.gatePlan}</Row>
      <Row label="Content digest">
        <Digest value={digest} characters="all" className="text-sm" />
      </Row>
    </dl>
  );
}

function Findings({ findings }: { findings: Summary['findings'] }) {
  const notable = findings.filter((finding) => finding.status === 'fail' || finding.status === 'caution');
  const fine = findings.filter((finding) => finding.status === 'pass');
  const unchecked = findings.filter((finding) => finding.status === 'not-run');
  const names = (list: Summary['findings']) => list.map((finding) => checkName(finding.checkId)).join(', ');
  return (
    <ul className="flex flex-col gap-1.5">
      {notable.map((finding, index) => (
        <li key={index}>
          <StatusWord state={finding.waived ? 'waived' : findingState[finding.status]} className="text-sm" />{' '}
          {finding.message}
          {finding.waived ? (
            <span className="block border-l-2 border-ochre pl-2 text-sm">waived: “{finding.waived}”</span>
          ) : null}
        </li>
      ))}
      {fine.length > 0 ? <li className="text-sm">Checked and fine: {names(fine)}.</li> : null}
      {unchecked.length > 0 ? <li className="text-sm text-slate">Not checked: {names(unchecked)}.</li> : null}
    </ul>
  );
}

function Row({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className="grid gap-x-4 py-2 sm:grid-cols-[8rem_1fr]">
      <dt className="font-mono text-label leading-5 text-slate uppercase">{label}</dt>
      <dd className="min-w-0">{children}</dd>
    </div>
  );
}
