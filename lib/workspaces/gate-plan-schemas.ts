import { z } from 'zod';
import { gateConditions, mostDueDays, mostGates, shapeProblems, signingRoles } from './check-gate-plan';
import { roles } from './role-names';
import { shortText } from './schemas';

const mostSigners = 50;

const key = z
  .string()
  .regex(/^[a-z0-9-]{1,40}$/, 'Keys are of a-z, 0-9 and hyphens.')
  .optional();
const name = shortText('the gate a name', 40);
const distinct = <T>(list: T[]) => new Set(list).size === list.length;

const AutomaticGateInput = z.object({
  kind: z.literal('automatic'),
  /** Kept from version to version, so that a gate that was renamed stays the same gate. */
  key,
  name,
  conditions: z
    .array(z.enum(gateConditions))
    .min(1, 'Say what the gate waits for.')
    .refine(distinct, 'Name each condition once.'),
});

const PeopleGateInput = z.object({
  kind: z.literal('people'),
  key,
  name,
  /** Empty where people are named. */
  roles: z
    .array(z.enum(signingRoles, 'Only designers, leads and approvers sign.'))
    .refine(distinct, 'Name each role once.')
    .default([]),
  /** Empty where roles decide. */
  people: z.array(z.uuid()).max(mostSigners).refine(distinct, 'Name each person once.').default([]),
  quorum: z.union([
    z.literal('all'),
    z.number().int().min(1, 'At least one has to sign.').max(mostSigners, `At most ${mostSigners}.`),
  ]),
  fourEyes: z.boolean().default(true),
  /** Days after the gate opens. */
  dueDays: z
    .number()
    .int('Whole days, please.')
    .min(1, 'At least one day.')
    .max(mostDueDays, `At most ${mostDueDays} days.`)
    .nullable()
    .default(null),
  meaning: shortText('the words that are signed', 300),
});

export const GateInput = z.discriminatedUnion('kind', [AutomaticGateInput, PeopleGateInput]);
export type GateInput = z.infer<typeof GateInput>;

export const ChangeGatePlanInput = z
  .object({
    gates: z
      .array(GateInput)
      .min(1, 'A plan has at least one gate.')
      .max(mostGates, `At most ${mostGates} gates.`),
    /** Said on purpose: the last name on this plan is the studio's. */
    endsWithoutClient: z.boolean().default(false),
  })
  .superRefine(({ gates }, ctx) => {
    for (const { at, field, detail } of shapeProblems(gates))
      ctx.addIssue({ code: 'custom', path: ['gates', ...(at === null ? [] : [at, field])], message: detail });
  });
export type ChangeGatePlanInput = z.infer<typeof ChangeGatePlanInput>;

export const GatePlanView = z.object({
  number: z.number().int(),
  madeAt: z.iso.datetime(),
  /** Null where it is not known any more. */
  madeBy: z.string().nullable(),
  gates: z.array(
    z.object({
      key: z.string(),
      name: z.string(),
      kind: z.enum(['automatic', 'people']),
      conditions: z.array(z.enum(gateConditions)),
      roles: z.array(z.enum(roles)),
      /** Named people; the name is null for somebody who has left. */
      people: z.array(z.object({ id: z.uuid(), name: z.string().nullable() })),
      quorum: z.union([z.number().int(), z.literal('all')]),
      fourEyes: z.boolean(),
      dueDays: z.number().int().nullable(),
      meaning: z.string(),
    }),
  ),
});
export type GatePlanView = z.infer<typeof GatePlanView>;
export type GateRuleView = GatePlanView['gates'][number];
