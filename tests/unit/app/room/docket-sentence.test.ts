import { describe, expect, it } from 'vitest';
import {
  byGroup,
  docketItems,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/docket-items';
import { docketSentence } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/docket-sentence';
import { docket, finding, thread } from './fixtures/docket';
import { revision } from './fixtures/revision';

const sentence = (given: Parameters<typeof docket>[0], view = revision()) =>
  docketSentence(byGroup(docketItems(docket(given))), view);

describe('docketSentence', () => {
  it('counts what must be settled before the gate that is open', () => {
    expect(sentence({})).toBe('2 to settle before the client gate, 2 to look at, 2 settled');
    const named = revision({ gates: [{ ...revision().gates.at(-1)!, name: 'QA', state: 'open' }] });
    expect(sentence({}, named)).toContain('2 to settle before the gate QA, ');
  });

  it('says that nothing must be settled only once the check has finished', () => {
    expect(sentence({ findings: [finding({ status: 'pass' })], threads: [] })).toBe('nothing to settle');
    const running = revision({ check: { ...revision().check, state: 'running' } });
    expect(sentence({ findings: [], threads: [] }, running)).toBe('the findings come with the check');
  });

  it('counts what was said after the approval by itself', () => {
    expect(sentence({ findings: [], threads: [thread({ afterApproval: true })] })).toBe(
      'nothing to settle, 1 after approval',
    );
  });
});
