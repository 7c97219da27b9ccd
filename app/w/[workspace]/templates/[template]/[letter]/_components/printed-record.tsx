'use client';

import { Digest } from '@/app/_components/digest';
import { formatBytes } from '@/app/_components/format-figure';
import { Time } from '@/app/_components/time';
import type { RevisionView } from '@/lib/review/schemas';

/** On paper only: the whole digests, and every signature with role, meaning, time and zone. */
export function PrintedRecord({ revision }: { revision: RevisionView }) {
  const signatures = revision.gates.flatMap((gate) =>
    gate.signatures.map((signature) => ({ ...signature, gate: gate.name })),
  );
  return (
    <section className="hidden text-sm print:block">
      <h2 className="border-t border-ink pt-2 font-semibold">Record</h2>
      <p>
        Mesh {revision.mesh.fileName}, {formatBytes(revision.mesh.bytes)}, {revision.mesh.triangles}{' '}
        triangles. SHA-256 <Digest value={revision.mesh.sha256} characters="all" />
      </p>
      <p>
        Content digest{' '}
        {revision.contentDigest ? (
          <Digest value={revision.contentDigest} characters="all" />
        ) : (
          'not there yet'
        )}
        {revision.lockedAt ? (
          <>
            , locked <Time at={revision.lockedAt} show="moment" />
          </>
        ) : (
          ', not locked: this print is not what was agreed'
        )}
      </p>
      {signatures.length > 0 ? (
        <table className="mt-2 w-full text-left">
          <caption className="text-left font-semibold">Signatures (electronic, simple)</caption>
          <thead>
            <tr>
              {['Gate', 'Name', 'Role', 'Decision', 'Meaning', 'Time', 'Content digest'].map((head) => (
                <th key={head} scope="col" className="border-b border-ink pr-2">
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {signatures.map((signature) => (
              <tr key={signature.id} className="align-top">
                <td className="pr-2">{signature.gate}</td>
                <td className="pr-2">{signature.printedName}</td>
                <td className="pr-2">
                  {signature.role}
                  {signature.signedFor ? `, for ${signature.signedFor}` : ''}
                </td>
                <td className="pr-2">{signature.decision === 'sign' ? 'signed' : 'returned'}</td>
                <td className="pr-2">{signature.reason ?? signature.meaning}</td>
                <td className="pr-2">
                  <Time at={signature.signedAt} show="moment" />
                </td>
                <td>
                  <Digest value={signature.contentDigest} characters="all" />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
    </section>
  );
}
