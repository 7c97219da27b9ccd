/** A field of an event: a UUID, a short word, a whole version, a share of 1; `?` where it may be left out. */
type Field = 'id' | 'id?' | 'word' | 'version?' | 'share';

/**
 * Live events carry ids and versions, never content: who receives one fetches what they may see. Told as plain data
 * and read by `readLiveEvent`, because every live page carries this file and a schema library would be a tenth of it.
 */
const fieldsOf = {
  'template.changed': { id: 'id', version: 'version?' },
  'draft.changed': { id: 'id', templateId: 'id' },
  'upload.changed': { id: 'id', templateId: 'id' },
  'revision.changed': { id: 'id', templateId: 'id', version: 'version?' },
  'docket.changed': { revisionId: 'id', threadId: 'id?' },
  'job.progressed': { id: 'id', subjectId: 'id', stage: 'word', progress: 'share' },
  'people.changed': { id: 'id' },
  'gate-plan.changed': { id: 'id', version: 'version?' },
  'today.changed': { id: 'id' },
} as const satisfies Record<string, Record<string, Field>>;

type Fields = typeof fieldsOf;
type Optional<F> = { [K in keyof F]: F[K] extends `${string}?` ? K : never }[keyof F];
type Value<F> = F extends 'version?' | 'share' ? number : string;
type Data<F> = { [K in Exclude<keyof F, Optional<F>>]: Value<F[K]> } & { [K in Optional<F>]?: Value<F[K]> };

export type LiveEventName = keyof Fields;
export type LiveEvent = { [N in LiveEventName]: { name: N; data: Data<Fields[N]> } }[LiveEventName];

/** An event on its way to a channel. */
export type LivePayload = LiveEvent & { channel: string };

export const liveEventNames = Object.keys(fieldsOf) as LiveEventName[];

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i;

const isField: Record<'id' | 'word' | 'version' | 'share', (value: unknown) => boolean> = {
  id: (value) => typeof value === 'string' && uuid.test(value),
  word: (value) => typeof value === 'string' && value.length <= 60,
  version: (value) => Number.isFinite(value),
  share: (value) => typeof value === 'number' && value >= 0 && value <= 1,
};

/**
 * Checks a name and its data, and leaves out what the event does not carry.
 * @returns null for events of the protocol itself and for anything misshapen
 */
export function readLiveEvent(name: string, data: unknown): LiveEvent | null {
  if (!Object.hasOwn(fieldsOf, name) || typeof data !== 'object' || data === null) return null;
  const given = data as Record<string, unknown>;
  const kept: Record<string, unknown> = {};
  for (const [key, field] of Object.entries(fieldsOf[name as LiveEventName])) {
    const value = given[key];
    if (value === undefined && field.endsWith('?')) continue;
    if (!isField[field.replace('?', '') as keyof typeof isField](value)) return null;
    kept[key] = value;
  }
  return { name, data: kept } as unknown as LiveEvent;
}
