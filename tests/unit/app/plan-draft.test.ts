import { describe, expect, it } from 'vitest';
import {
  draftOf,
  fieldProblems,
  inputOf,
  moved,
  newGate,
  viewOf,
} from '@/app/w/[workspace]/gate-plan/_components/plan-draft';
import { defaultGatePlan } from '@/lib/workspaces/default-gate-plan';
import { ChangeGatePlanInput } from '@/lib/workspaces/gate-plan-schemas';
import { fullRule, ruleView, rulesOf } from '@/lib/workspaces/gate-rules';

const id = '0192f1c4-0000-7000-8000-000000000001';
const names = new Map([[id, 'Ada']]);
const plan = defaultGatePlan.map((rule) => ruleView(rule, names));

describe('a plan that is edited', () => {
  it('and not changed is sent as it was', () => {
    const input = ChangeGatePlanInput.parse({ gates: plan.map(draftOf).map(inputOf) });
    const sent = rulesOf(input.gates).map(({ meaning, ...rule }) => ({
      ...rule,
      ...(rule.kind === 'people' ? { meaning } : {}),
    }));
    const stands = defaultGatePlan.map(fullRule).map(({ meaning, ...rule }) => ({
      ...rule,
      ...(rule.kind === 'people' ? { meaning } : {}),
    }));
    expect(sent).toEqual(stands);
  });

  it('sends what is chosen now, and keeps what was chosen before', () => {
    const draft = { ...draftOf(plan[1]), who: 'people' as const, people: [id], howMany: 'all' as const };
    expect(inputOf(draft)).toMatchObject({ roles: [], people: [id], quorum: 'all' });
    expect(inputOf({ ...draft, who: 'roles', howMany: 'several', several: 3 })).toMatchObject({
      roles: ['designer', 'lead'],
      people: [],
      quorum: 3,
    });
  });

  it('is told as it would be read', () => {
    const draft = { ...newGate('people'), name: 'Tooling', who: 'people' as const, people: [id] };
    expect(viewOf(draft, [{ id, name: 'Ada' }])).toMatchObject({
      name: 'Tooling',
      people: [{ id, name: 'Ada' }],
      quorum: 1,
      fourEyes: true,
    });
  });

  it('no longer names who has left', () => {
    const gone = ruleView({ ...fullRule(defaultGatePlan[1]), roles: [], people: [id] }, new Map());
    expect(draftOf(gone).people).toEqual([]);
  });

  it('says which field is empty', () => {
    const fields = (gate: ReturnType<typeof newGate>) => fieldProblems([gate]).map(({ field }) => field);
    expect(fields(newGate('people'))).toEqual(['name']);
    expect(
      fields({ ...newGate('people'), name: 'A', meaning: ' ', howMany: 'several', several: null }),
    ).toEqual(['quorum', 'meaning']);
    expect(fields({ ...newGate('automatic'), name: 'A', conditions: [] })).toEqual(['conditions']);
  });

  it('moves one gate and leaves the others in order', () => {
    expect(moved(['a', 'b', 'c'], 0, 2)).toEqual(['b', 'c', 'a']);
    expect(moved(['a', 'b', 'c'], 2, 1)).toEqual(['a', 'c', 'b']);
  });
});
