import type { TenantTx } from '@/db/tenant';
import { composeContent } from './content';
import { openMustSettle } from './docket-data';
import type { SignatureRow } from './gate-data';
import type { RevisionRow } from './revision-data';

/**
 * Whether a gate that has its names may pass. A signature has found both so; a gate that has them because somebody left
 * may still hold an item to settle, and what the last gate locks has to be what the last name stands on.
 */
export async function mayPass(
  tx: TenantTx,
  revision: RevisionRow,
  signed: SignatureRow[],
  isLast: boolean,
): Promise<boolean> {
  if ((await openMustSettle(tx, revision.workspaceId, revision.id)).length) return false;
  if (!isLast) return true;
  const last = signed.filter(({ decision }) => decision === 'sign').at(-1);
  const now = await composeContent(tx, revision);
  return now !== null && now.digest === last?.contentDigest;
}
