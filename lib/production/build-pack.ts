import { createHash } from 'node:crypto';
import { Transform } from 'node:stream';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf, sha256 } from '@/lib/audit/canonical';
import type { JobContext } from '@/lib/auth/context';
import { holdsJob, type Fence } from '@/lib/jobs/fence';
import { queueLive } from '@/lib/jobs/queue-live';
import { loadAgreed, type Agreed } from '@/lib/review/load-agreed';
import { packKey } from '@/lib/storage/keys';
import { putStream } from '@/lib/storage/put-stream';
import { store } from '@/lib/storage/store';
import type { CertificateModel } from './certificate/certificate-model';
import { meshNameOf, packFiles, type PackFile } from './pack/pack-files';
import { zipPack } from './pack/zip-pack';
import { packRecord } from './pack-record';
import { findRelease, keepPack, packOfRelease, pictureOf, workspaceOf } from './production-data';

/** What the pack would be made of is not what was agreed; trying again cannot help. */
export class PackRefused extends Error {
  override readonly name = 'PackRefused';
}

/**
 * Builds the release pack and keeps it in the store: once a release, whoever builds it first. The mesh is
 * streamed from the store and hashed on its way; a single other byte and no pack is kept.
 * @throws {PackRefused} where stored parts and signed content do not agree
 */
export async function buildPack(
  ctx: JobContext,
  fence: Fence,
  releaseId: string,
  signal: AbortSignal,
): Promise<void> {
  const { workspaceId } = ctx;
  const found = await withTenant(ctx, async (tx) => {
    const release = await findRelease(tx, workspaceId, releaseId);
    if (!release) throw new PackRefused('The release is not there.');
    const there = await packOfRelease(tx, workspaceId, releaseId);
    return there ? null : { release, workspace: await workspaceOf(tx, workspaceId) };
  });
  if (!found) return;
  const { release, workspace } = found;
  const agreed = await loadAgreed(ctx, release.revisionId);
  proveAgreed(agreed);
  const model: CertificateModel = {
    studioName: workspace.studioName,
    workspaceName: workspace.name,
    timeZone: workspace.timeZone,
    agreed,
    release: { byName: release.releasedByName, at: release.createdAt.toISOString(), note: release.note },
    picture: await loadPicture(ctx, agreed.mesh.id),
    meshFileInPack: meshNameOf(agreed),
  };
  const files = await packFiles(model);
  const mesh = { name: model.meshFileInPack, bytes: agreed.mesh.bytes, sha256: agreed.mesh.sha256 };
  const all = [mesh, ...files].map(({ name, bytes, sha256: sum }) => ({
    name,
    bytes: typeof bytes === 'number' ? bytes : bytes.byteLength,
    sha256: sum,
  }));
  const kept = await writePack(ctx, [...files, sumsOf(all)], agreed, model, signal);

  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const fileName = packName(agreed);
    const pack = await keepPack(tx, { workspaceId, releaseId, fileName, files: all, ...kept });
    if (!pack) return;
    await appendEntry(tx, ctx, {
      action: 'pack.built',
      subjectKind: 'pack',
      subjectId: releaseId,
      detail: {
        templateId: agreed.template.id,
        revisionId: agreed.revision.id,
        letter: agreed.revision.letter,
        pack: packRecord(pack),
      },
    });
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: agreed.revision.id, templateId: agreed.template.id },
    });
  });
}

/** Everything but the mesh's bytes, which are hashed while they are read. */
function proveAgreed({ lock, mesh, recipe, report, signatures, revision }: Agreed): void {
  const { content, contentDigest } = lock;
  const wrong = (what: string) =>
    new PackRefused(
      `${what} of revision ${revision.letter} is not what was agreed. Have the audit chain verified.`,
    );
  if (digestOf(content) !== contentDigest) throw wrong('The locked content');
  if (content.mesh.sha256 !== mesh.sha256 || content.mesh.bytes !== mesh.bytes) throw wrong('The mesh');
  if (digestOf(recipe.body) !== content.recipeDigest || digestOf(content.recipe) !== content.recipeDigest)
    throw wrong('The recipe');
  if (digestOf(report.body) !== content.report.sha256) throw wrong('The report');
  if (signatures.some((one) => one.decision === 'sign' && !one.content)) throw wrong('A signature');
}

async function loadPicture(ctx: JobContext, meshId: string): Promise<Uint8Array | null> {
  const row = await withTenant(ctx, (tx) => pictureOf(tx, ctx.workspaceId, meshId));
  if (!row) return null;
  const bytes = await store().getBytes(row.storeKey);
  // A picture that is not the one that was drawn is left out; it is an aid, not part of what was agreed.
  return sha256(bytes) === row.sha256 ? bytes : null;
}

/** `sha256sum -c` reads this; names never start with a star, a backslash or hold a line break. */
function sumsOf(files: { name: string; sha256: string }[]): PackFile {
  const text = files.map(({ name, sha256: sum }) => `${sum}  ${name}\n`).join('');
  const bytes = Buffer.from(text, 'utf8');
  return { name: 'SHA256SUMS', bytes, sha256: sha256(bytes) };
}

async function writePack(
  ctx: JobContext,
  files: PackFile[],
  agreed: Agreed,
  model: CertificateModel,
  signal: AbortSignal,
): Promise<{ storeKey: string; bytes: number; sha256: string }> {
  const storeKey = packKey(ctx.workspaceId);
  const source = await store().getStream(agreed.mesh.storeKey, signal);
  const checked = source.pipe(onlyExactly(agreed.mesh.sha256, agreed.mesh.bytes));
  source.on('error', (error) => checked.destroy(error));
  const archive = zipPack(files, { name: model.meshFileInPack, stream: checked }, new Date(model.release.at));
  try {
    const written = await putStream(store(), storeKey, archive, 'application/zip', signal);
    return { storeKey, ...written };
  } finally {
    source.destroy();
    archive.destroy();
  }
}

/** Lets bytes through and fails at the end unless they are exactly those that were agreed. */
function onlyExactly(sha256Hex: string, bytes: number): Transform {
  const hash = createHash('sha256');
  let seen = 0;
  return new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      seen += chunk.length;
      done(null, chunk);
    },
    flush(done) {
      const same = seen === bytes && hash.digest('hex') === sha256Hex;
      done(same ? null : new PackRefused('The mesh in the store is not the one that was agreed.'));
    },
  });
}

const packName = ({ template, revision }: Agreed) =>
  `${template.number}-${revision.letter}-release-pack.zip`.replace(/[^A-Za-z0-9.\-]+/g, '-');
