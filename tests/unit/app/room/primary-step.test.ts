import { describe, expect, it } from 'vitest';
import {
  newerSibling,
  primaryStep,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/primary-step';
import { digest, gate, ids, revision } from './fixtures/revision';

const addresses = { pack: '/pack', post: '/post' };
const nothing = { ...revision().can, sign: null, release: false, post: false, download: false };

describe('primaryStep', () => {
  it('offers an approver to sign, in the words of the gate', () => {
    expect(primaryStep(revision(), addresses)).toMatchObject({ kind: 'sign', label: 'Sign for the client' });
    // A name that a lead gave stays as it was written.
    const sign = { ...revision().can.sign!, gateName: 'QA of Ines' };
    expect(primaryStep(revision({ can: { ...nothing, sign } }), addresses)?.label).toBe(
      'Sign for QA of Ines',
    );
  });

  it('sends a signer to the open items first while they keep the gate shut', () => {
    const sign = { ...revision().can.sign!, blocked: '2 items must be settled first.' };
    expect(primaryStep(revision({ can: { ...nothing, sign } }), addresses)).toMatchObject({
      kind: 'settle',
      detail: expect.stringContaining('2 items must be settled first.'),
    });
  });

  it('offers production to release what is approved, and then the pack', () => {
    const approved = revision({ state: 'approved', can: { ...nothing, release: true, download: true } });
    expect(primaryStep(approved, addresses)?.kind).toBe('release');
    const pack = { fileName: 'QP-014-C.zip', bytes: 10, sha256: digest };
    const release = {
      id: ids.client,
      byName: 'J. Halvorsen',
      at: '2026-12-02T08:00:00.000Z',
      note: '',
      pack,
      packJob: null,
    };
    const released = revision({ state: 'released', release, can: { ...nothing, download: true } });
    expect(primaryStep(released, addresses)).toMatchObject({ kind: 'download', href: '/pack' });
  });

  it('offers the studio the next revision once this one is closed or fails, unless it is there already', () => {
    const can = { ...nothing, post: true };
    expect(primaryStep(revision({ state: 'returned', can }), addresses)?.kind).toBe('post');
    const check = { ...revision().check, verdict: 'fail' as const };
    const forming = gate({ id: ids.forming, name: 'Forming', kind: 'automatic', state: 'open' });
    expect(primaryStep(revision({ check, gates: [forming], can }), addresses)?.kind).toBe('post');
    expect(primaryStep(revision({ check, can }), addresses)).toBeNull();
    const siblings = [...revision().siblings, { id: ids.okafor, letter: 'D', state: 'in_review' as const }];
    expect(primaryStep(revision({ state: 'returned', can, siblings }), addresses)).toBeNull();
  });

  it('offers nothing to who can only look', () => {
    expect(primaryStep(revision({ can: nothing }), addresses)).toBeNull();
  });
});

describe('newerSibling', () => {
  it('is the newest one that came after, or none', () => {
    expect(newerSibling(revision())).toBeNull();
    expect(newerSibling(revision({ id: ids.revisionA }))?.letter).toBe('C');
  });
});
