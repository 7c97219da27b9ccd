import { z } from 'zod';
import { standing } from './schemas';

/** What the desk of a person shows. Browser-safe. */

const instant = z.iso.datetime();

export const TodayItem = z.object({
  kind: z.enum(['sign', 'settle', 'answer', 'fix', 'release', 'draft', 'mention']),
  workspace: z.object({ name: z.string(), slug: z.string() }),
  templateNumber: z.string(),
  templateTitle: z.string(),
  letter: z.string().nullable(),
  path: z.string(),
  text: z.string(),
  since: instant,
  dueOn: z.iso.date().nullable(),
  /** How far the template has come: what is agreed is no longer overdue. */
  standing,
});
export type TodayItem = z.infer<typeof TodayItem>;
export const TodayView = z.object({
  items: z.array(TodayItem),
  recent: z.array(z.object({ workspace: z.string(), text: z.string(), path: z.string(), at: instant })),
});
export type TodayView = z.infer<typeof TodayView>;
