import { createHash } from 'node:crypto';
import { canonical } from './canonical';

export type ChainedEntry = {
  workspaceId: string;
  seq: number;
  at: string;
  actorId: string | null;
  actorName: string;
  action: string;
  subjectKind: string;
  subjectId: string;
  detail: Record<string, unknown>;
};

/** Hash before the first entry of a workspace. */
export const genesis = '0'.repeat(64);

/** SHA-256(0x00 ‖ previous hash ‖ RFC 8785 canonical entry); 0x00 sets leaves apart as in RFC 6962 §2.1. */
export function entryHash(previous: string, entry: ChainedEntry): string {
  return createHash('sha256')
    .update(Buffer.from([0]))
    .update(Buffer.from(previous, 'hex'))
    .update(canonical(entry))
    .digest('hex');
}
