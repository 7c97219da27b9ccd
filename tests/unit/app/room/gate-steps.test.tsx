import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { GateLine } from '@/app/_components/gate-line';
import { gateSteps } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/gate-steps';
import type { RevisionView } from '@/lib/review/schemas';
import { gate, ids, revision, signature } from './fixtures/revision';

const none = { failing: 0, waived: 0, notRun: 0 };
const words = (view: RevisionView, findings = none, mustSettle = 0) =>
  renderToStaticMarkup(<GateLine gates={gateSteps(view, findings, mustSettle)} />)
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll(/\s+/g, ' ');

describe('the gate line of a revision', () => {
  it('ends with locked and released, whatever the plan', () => {
    expect(gateSteps(revision(), none, 0).map((step) => [step.name, step.state])).toEqual([
      ['Forming', 'passed'],
      ['Studio', 'passed'],
      ['Client', 'open'],
      ['Locked', 'ahead'],
      ['Released', 'ahead'],
    ]);
  });

  it('names signers with their words, who is awaited, and what must be settled first', () => {
    const text = words(revision(), { failing: 0, waived: 1, notRun: 5 }, 2);
    expect(text).toContain('no failing finding open, 1 Dec 2026');
    expect(text).toContain('one finding waived , 5 checks were not run');
    expect(text).toMatch(/L\. Okafor , lead, 1 Dec 2026, 10:05 UTC “ready for the client”/);
    expect(text).toContain('waits for A. Brandt');
    expect(text).toContain('2 items to settle first');
  });

  it('says what the forming gate waits for', () => {
    const forming = (change: Partial<RevisionView['check']>, findings = none) =>
      words(
        revision({
          check: { ...revision().check, ...change },
          gates: [gate({ id: ids.forming, name: 'Forming', kind: 'automatic', state: 'open' })],
        }),
        findings,
      );
    expect(forming({ state: 'running' })).toContain('being checked');
    expect(forming({ state: 'failed' })).toContain('did not finish');
    expect(forming({}, { ...none, failing: 2 })).toContain('2 findings to mend or to waive');
  });

  it('gives the reason of a return, and closes what came after', () => {
    const view = revision({
      state: 'returned',
      gates: [
        gate({
          id: ids.studio,
          name: 'Studio',
          state: 'returned',
          signatures: [signature({ decision: 'return', reason: 'The rim must be 12 mm.' })],
        }),
        gate({ id: ids.client, name: 'Client', ordinal: 2, state: 'closed' }),
      ],
    });
    const text = words(view);
    expect(text).toContain('“The rim must be 12 mm.”');
    expect(text).toContain('closed with the revision');
  });

  it('counts signatures where more than one is needed', () => {
    const view = revision({
      gates: [
        gate({
          id: ids.client,
          name: 'Client',
          state: 'open',
          quorum: 2,
          signatures: [signature()],
          awaited: ['P. Duarte', 'A. Brandt'],
        }),
      ],
    });
    expect(words(view)).toContain('P. Duarte or A. Brandt');
    expect(words(view)).toContain('1 of 2 signed');
  });

  it('says that everybody is needed, by which day, and for whom somebody signed', () => {
    const everybody = gate({
      id: ids.client,
      name: 'Client',
      state: 'open',
      quorum: 3,
      everybody: true,
      dueOn: '2026-12-09',
      signatures: [signature({ signedFor: 'J. Halvorsen' })],
      awaited: ['P. Duarte', 'A. Brandt'],
    });
    const text = words(revision({ gates: [everybody] }));
    expect(text).toContain('L. Okafor , lead, for J. Halvorsen,');
    expect(text).toContain('waits for P. Duarte and A. Brandt');
    // The gate's own day, not that of the template.
    expect(text).toMatch(/due 9 Dec 2026 .*1 of 3 signed/);
    expect(words(revision({ gates: [{ ...everybody, dueOn: null }] }))).toContain('due 3 Dec 2026');
    expect(words(revision({ gates: [{ ...everybody, state: 'waiting' }] }))).toContain('everybody signs');
  });

  it('says that a gate cannot pass, and what a gate for the docket waits for', () => {
    const short = gate({ id: ids.client, name: 'Client', state: 'open', short: true });
    expect(words(revision({ gates: [short] }))).toContain('too few are left who may sign');
    const held = gate({ id: ids.client, name: 'Client', state: 'open', held: true });
    expect(words(revision({ gates: [held] }))).toContain('added since the last signature');
    const docket = (change: Partial<RevisionView['gates'][number]>) =>
      revision({
        gates: [
          gate({
            id: ids.forming,
            name: 'Docket',
            kind: 'automatic',
            conditions: ['docket-settled'],
            ...change,
          }),
        ],
      });
    expect(words(docket({ state: 'open' }), { ...none, failing: 1 }, 2)).toContain('2 items to settle first');
    expect(words(docket({ state: 'waiting' }))).toContain('by the docket');
    expect(words(docket({ state: 'passed', passedAt: '2026-12-01T09:42:00.000Z' }))).toContain(
      'nothing left to settle, 1 Dec 2026',
    );
  });
});
