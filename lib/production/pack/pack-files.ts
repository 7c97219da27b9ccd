import { readFile } from 'node:fs/promises';
import { canonical, sha256 } from '@/lib/audit/canonical';
import type { Agreed } from '@/lib/review/load-agreed';
import { nameByFormat } from '@/lib/review/mesh-format';
import { renderCertificate } from '../certificate/render-certificate';
import type { CertificateModel } from '../certificate/certificate-model';
import { packReadme } from './pack-readme';
import { safeName } from './safe-name';

export type PackFile = { name: string; bytes: Uint8Array; sha256: string };

const file = (name: string, content: string | Uint8Array): PackFile => {
  const bytes = typeof content === 'string' ? Buffer.from(content, 'utf8') : content;
  return { name, bytes, sha256: sha256(bytes) };
};
const readable = (value: unknown) => `${JSON.stringify(value, null, 2)}\n`;

/**
 * Every file of a pack but the mesh (streamed from the store) and SHA256SUMS (made last). `content.json` is
 * the canonical text itself, so that its SHA-256 is the digest that was signed.
 */
export async function packFiles(model: CertificateModel): Promise<PackFile[]> {
  const { agreed, release } = model;
  const earlier = earlierContents(agreed);
  const files = [
    file('content.json', canonical(agreed.lock.content)),
    ...earlier.map(({ name, content }) => file(name, canonical(content))),
    file('signatures.json', readable(signaturesOf(agreed, release))),
    file('recipe.json', readable(agreed.recipe.body)),
    file('report.json', readable(agreed.report.body)),
    file('docket.json', readable(agreed.lock.docket)),
    file('certificate.pdf', await renderCertificate(model)),
    file('check-pack.mjs', await readFile(new URL('check-pack.mjs', import.meta.url))),
  ];
  return [
    ...files,
    file(
      'README.txt',
      packReadme(
        model,
        files.map(({ name }) => name),
      ),
    ),
  ];
}

/** Name of the mesh inside the pack. */
export const meshNameOf = (agreed: Agreed) =>
  safeName(nameByFormat(agreed.mesh.fileName, agreed.mesh.format));

const earlierName = (digest: string) => `content-as-signed-${digest.slice(0, 12)}.json`;

/** Contents of signatures given before later notes joined the docket: each hashes to its own signature's digest. */
function earlierContents({ lock, signatures }: Agreed): { name: string; content: unknown }[] {
  const seen = new Map<string, unknown>();
  for (const { contentDigest, content } of signatures)
    if (contentDigest !== lock.contentDigest && content) seen.set(contentDigest, content);
  return [...seen].map(([digest, content]) => ({ name: earlierName(digest), content }));
}

function signaturesOf(
  { template, revision, lock, signatures }: Agreed,
  release: CertificateModel['release'],
) {
  return {
    schema: 1,
    template: { number: template.number, title: template.title, dueOn: template.dueOn },
    revision: {
      id: revision.id,
      letter: revision.letter,
      author: revision.authorName,
      postedAt: revision.postedAt,
    },
    contentDigest: lock.contentDigest,
    lockedAt: lock.lockedAt,
    signatures: signatures.map((one) => ({
      id: one.id,
      gate: one.gateName,
      decision: one.decision,
      signerId: one.signerId,
      printedName: one.printedName,
      role: one.role,
      meaning: one.meaning,
      reason: one.reason,
      signedAt: one.signedAt,
      timeZone: one.timeZone,
      /** Whom the signer stood in for while they were away. */
      signedFor: one.signedFor,
      method: one.method,
      contentDigest: one.contentDigest,
      content:
        one.contentDigest === lock.contentDigest
          ? 'content.json'
          : one.content
            ? earlierName(one.contentDigest)
            : null,
    })),
    release: { by: release.byName, at: release.at, note: release.note },
  };
}
