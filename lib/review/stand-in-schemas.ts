import { z } from 'zod';

/** Longer than any leave that should not be a change of roles instead. */
export const mostDaysAway = 180;

const day = z.iso.date('Write the date as YYYY-MM-DD.');

export const NameStandInInput = z
  .object({
    standInId: z.uuid('Choose who signs for you.'),
    /** First and last day, in the workspace's zone. */
    fromOn: day,
    untilOn: day,
  })
  .refine(({ fromOn, untilOn }) => fromOn <= untilOn, {
    path: ['untilOn'],
    error: 'The last day comes before the first.',
  })
  .refine(({ fromOn, untilOn }) => Date.parse(untilOn) - Date.parse(fromOn) < mostDaysAway * 86_400_000, {
    path: ['untilOn'],
    error: `At most ${mostDaysAway} days. For longer, ask a lead to give the role to somebody else.`,
  });
export type NameStandInInput = z.infer<typeof NameStandInInput>;

export const StandInParams = z.object({ standIn: z.uuid() });

export const StandInView = z.object({
  id: z.uuid(),
  away: z.object({ id: z.uuid(), name: z.string() }),
  standIn: z.object({ id: z.uuid(), name: z.string() }),
  role: z.string(),
  fromOn: z.iso.date(),
  untilOn: z.iso.date(),
  /** Today lies between the two days, where the workspace is. */
  now: z.boolean(),
  /** Whether the reader may end it. */
  mayEnd: z.boolean(),
});
export type StandInView = z.infer<typeof StandInView>;
export const StandInsView = z.object({
  /** The day that it is in the workspace. */
  today: z.iso.date(),
  standIns: z.array(StandInView),
});
export type StandInsView = z.infer<typeof StandInsView>;
