import { zonedTime } from '@/lib/time/zoned-time';
import { formingCautions } from '../cautions';
import type { CertificateModel } from '../certificate/certificate-model';

const what: Record<string, string> = {
  'content.json': 'what was agreed, as canonical JSON (RFC 8785); its SHA-256 is the digest that was signed',
  'signatures.json': 'who signed: printed name, role, meaning, date and time, digest; and who released it',
  'recipe.json': 'how the template is printed and the sheet formed, as frozen when the revision was posted',
  'report.json': 'the engine’s whole report on exactly this mesh and recipe',
  'docket.json': 'all findings, waivers, threads and notes as they stood when the revision was locked',
  'certificate.pdf': 'the same for reading and printing',
  'check-pack.mjs': 'a small script that does all the checks below; read it first, then run it',
};

/** README.txt of a pack: what is in it, how to check it, and the cautions. Names are cut free of line breaks. */
export function packReadme(model: CertificateModel, names: string[]): string {
  const { agreed, release, meshFileInPack } = model;
  const { template, revision, lock, mesh } = agreed;
  const line = (text: string) => text.replace(/\s+/g, ' ').trim();
  const entry = (name: string, about: string) => `  ${name}\n      ${about}`;
  return `${line(`${template.number} revision ${revision.letter}: ${template.title}`)}
Release pack, made by Firstpull

${line(`${model.workspaceName} and ${model.studioName} agreed on this template.`)}
${line(`Released by ${release.byName}`)}
on ${zonedTime(release.at, model.timeZone)}.

IN THIS PACK

${entry(meshFileInPack, 'the mesh, byte for byte as it was posted, checked and signed')}
${names.map((name) => entry(name, what[name] ?? 'the content of an earlier signature, given before later notes joined the docket')).join('\n')}
${entry('SHA256SUMS', 'the SHA-256 of every file above')}

TO CHECK IT (no account and no network needed)

With Node.js 18 or later, unpack, open a terminal in the folder, and run

     node check-pack.mjs ${lock.contentDigest}

It names every file that is not as it was agreed. Without it, by hand:

1. Unpack, open a terminal in the folder, and run

     sha256sum -c SHA256SUMS          (Linux; on macOS: shasum -a 256 -c SHA256SUMS)

   Every line must end in OK. On Windows, PowerShell's Get-FileHash gives the
   same sums one by one.

2. Run

     sha256sum content.json

   It must give the digest that was signed:

     ${lock.contentDigest}

   Compare it with the certificate you were handed, or with the one in the mail
   about the signature. A pack that was put together by somebody else can have
   right sums; it cannot have this digest.

3. content.json names the mesh under "mesh". Its "sha256" must be

     ${mesh.sha256}

   and so must the sum of the mesh file. signatures.json gives for each
   signature the digest it stands on and the file that has this digest.

The digest proves what was agreed. Who signed, when and with what meaning is
proven by the audit chain of the workspace: ask the studio to verify it where
a name or a time is in doubt.

BEFORE ANYONE ACTS ON IT

${formingCautions.map((text) => wrap(`* ${text}`)).join('\n')}
`;
}

/** Lines of at most 76 characters, the following ones indented by two. */
function wrap(text: string): string {
  const lines = [''];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1];
    if (last && last.length + word.length > 75) lines.push(`  ${word}`);
    else lines[lines.length - 1] = last ? `${last} ${word}` : word;
  }
  return lines.join('\n');
}
