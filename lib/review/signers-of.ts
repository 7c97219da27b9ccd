import type { TenantTx } from '@/db/tenant';
import { signaturesOf } from './gate-data';
import type { GatesAt } from './gate-view';
import { workspacePeople } from './people-data';
import type { RevisionRow } from './revision-data';
import { activeStandIns } from './stand-in-data';
import { makersOf, type StandIn } from './who-signs';

/**
 * What the gates of a revision share, as things stand: its makers, the people, who stands in for whom, the signatures.
 * @param mesh the one that was posted: whoever sent it made the revision too
 * @param standIns where the caller has read them already, e.g. to hold them first
 */
export async function signersOf(
  tx: TenantTx,
  revision: RevisionRow,
  mesh: { createdBy: string },
  standIns?: StandIn[],
): Promise<GatesAt> {
  const { workspaceId } = revision;
  return {
    makers: makersOf(revision, mesh),
    people: await workspacePeople(tx, workspaceId),
    standIns: standIns ?? (await activeStandIns(tx, workspaceId)),
    signed: await signaturesOf(tx, workspaceId, revision.id),
  };
}
