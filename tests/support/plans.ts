import type { WorkspaceContext } from '@/lib/auth/context';
import { changeGatePlan } from '@/lib/workspaces/change-gate-plan';
import type { GateInput } from '@/lib/workspaces/gate-plan-schemas';
import { readGatePlan } from '@/lib/workspaces/read-gate-plan';

type PeopleGate = Extract<GateInput, { kind: 'people' }>;

export const formingGate: GateInput = {
  kind: 'automatic',
  key: 'forming',
  name: 'Forming',
  conditions: ['checks-pass'],
};

/** A gate that people sign: one approver, under four eyes, unless told otherwise. */
export const peopleGate = (change: Partial<PeopleGate> = {}): PeopleGate => ({
  kind: 'people',
  key: 'client',
  name: 'Client',
  roles: change.people?.length ? [] : ['approver'],
  people: [],
  quorum: 1,
  fourEyes: true,
  dueDays: null,
  meaning: 'Agreed, in a test.',
  ...change,
});

/** Makes these gates the plan of the next revision. */
export async function setPlan(lead: WorkspaceContext, gates: GateInput[], endsWithoutClient = false) {
  const { number } = await readGatePlan(lead);
  return changeGatePlan(lead, number, { gates, endsWithoutClient });
}
