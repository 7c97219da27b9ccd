import { z } from 'zod';

const id = z.uuid();

/** Live events carry ids and versions, never content: who receives one fetches what they may see. */
export const liveEvents = {
  'template.changed': z.object({ id, version: z.number().optional() }),
  'draft.changed': z.object({ id, templateId: id }),
  'upload.changed': z.object({ id, templateId: id }),
  'revision.changed': z.object({ id, templateId: id, version: z.number().optional() }),
  'docket.changed': z.object({ revisionId: id, threadId: id.optional() }),
  'job.progressed': z.object({
    id,
    subjectId: id,
    stage: z.string().max(60),
    progress: z.number().min(0).max(1),
  }),
  'people.changed': z.object({ id }),
  'today.changed': z.object({ id }),
} as const;

export type LiveEventName = keyof typeof liveEvents;
export type LiveEvent = {
  [N in LiveEventName]: { name: N; data: z.infer<(typeof liveEvents)[N]> };
}[LiveEventName];

export const liveEventNames = Object.keys(liveEvents) as LiveEventName[];

/** What the outbox stores for the relay. */
export const livePayload = z.object({
  channel: z.string(),
  name: z.enum(liveEventNames as [LiveEventName, ...LiveEventName[]]),
  data: z.record(z.string(), z.unknown()),
});
export type LivePayload = z.infer<typeof livePayload>;
