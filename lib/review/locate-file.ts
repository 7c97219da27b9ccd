import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { store } from '@/lib/storage/store';
import { asId } from './as-id';
import { derivativesOf } from './check-data';
import { mediaTypeOf, nameByFormat } from './mesh-format';
import { requireNotRecalled } from './recalled';
import { findRevision, loadRevisionParts } from './revision-data';

export type RevisionFile = 'model' | 'picture' | 'thumbnail' | 'sheet' | 'mesh';
const [glb, png] = ['model/gltf-binary', 'image/png'];
const types = { model: glb, picture: png, thumbnail: png, sheet: glb } as const;
const endings = { model: 'glb', picture: 'png', thumbnail: 'png', sheet: 'glb' } as const;

/**
 * A short-lived address in the store for one file of a revision. The mesh is the exact bytes that were
 * posted. Throws conflict `recalled` for the mesh of a recalled revision, for anyone but a lead.
 */
export async function locateFile(
  ctx: WorkspaceContext,
  revisionId: string,
  file: RevisionFile,
): Promise<string> {
  // The model on the page is for everyone; the exact bytes are what is made from.
  requirePermission(ctx, file === 'mesh' ? 'pack.download' : 'workspace.read');
  const id = asId(revisionId, 'revision');
  const found = await withTenant(ctx, async (tx) => {
    const revision = await findRevision(tx, ctx.workspace.id, id);
    const { template, mesh, recipe } = await loadRevisionParts(tx, revision);
    if (file === 'mesh') {
      requireNotRecalled(ctx, revision);
      const fileName = nameByFormat(mesh.fileName, mesh.format);
      return { key: mesh.storeKey, fileName, contentType: mediaTypeOf(mesh.format), inline: false };
    }
    const made = (await derivativesOf(tx, ctx.workspace.id, mesh.id, recipe.digest)).find(
      (row) => row.kind === file,
    );
    if (!made) throw notFound(file);
    const fileName = `${template.number}-${revision.letter}-${file}.${endings[file]}`;
    return { key: made.storeKey, fileName, contentType: types[file], inline: true };
  });
  const { key, ...name } = found;
  return store().presignGet(key, name);
}
