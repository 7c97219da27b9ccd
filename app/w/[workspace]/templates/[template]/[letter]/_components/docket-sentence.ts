import type { RevisionView } from '@/lib/review/schemas';
import type { DocketGroup, DocketItem } from './docket-items';
import { theGate } from './gate-in-words';

/** `2 to settle before the client gate, 3 to look at, 11 settled`. */
export function docketSentence(
  groups: Record<DocketGroup, DocketItem[]>,
  { gates, check }: Pick<RevisionView, 'gates' | 'check'>,
): string {
  const next = gates.find((gate) => gate.state === 'open' || gate.state === 'waiting');
  const parts: string[] = [];
  const settle = groups.settle.length;
  if (settle > 0) parts.push(`${settle} to settle${next ? ` before ${theGate(next.name)}` : ''}`);
  else if (check.state === 'finished') parts.push('nothing to settle');
  else parts.push('the findings come with the check');
  if (groups.look.length > 0) parts.push(`${groups.look.length} to look at`);
  if (groups.settled.length > 0) parts.push(`${groups.settled.length} settled`);
  if (groups.after.length > 0) parts.push(`${groups.after.length} after approval`);
  return parts.join(', ');
}
