import { liveEventNames, liveEvents, type LiveEvent, type LiveEventName } from '@/realtime/events';

/** Checks what came over the wire; null for events of the protocol itself and for anything misshapen. */
export function readLiveEvent(name: string, data: unknown): LiveEvent | null {
  if (!liveEventNames.includes(name as LiveEventName)) return null;
  const parsed = liveEvents[name as LiveEventName].safeParse(data);
  return parsed.success ? ({ name, data: parsed.data } as LiveEvent) : null;
}
