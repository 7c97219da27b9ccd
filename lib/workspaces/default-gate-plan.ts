import type { GateRule } from '@/db/schema/workspaces';

/** The gates that a new workspace starts with; a lead may make other versions. */
export const defaultGatePlan: GateRule[] = [
  {
    key: 'forming',
    name: 'Forming',
    kind: 'automatic',
    roles: [],
    quorum: 0,
    fourEyes: false,
    meaning: 'Checked by Firstpull: no failing finding is open.',
  },
  {
    key: 'studio',
    name: 'Studio',
    kind: 'people',
    roles: ['designer', 'lead'],
    quorum: 1,
    fourEyes: true,
    meaning: 'I checked this revision for the studio and stand by it.',
  },
  {
    key: 'client',
    name: 'Client',
    kind: 'people',
    roles: ['approver'],
    quorum: 1,
    fourEyes: true,
    meaning: 'I agree to this revision for the client: it may be printed and formed as shown.',
  },
];
