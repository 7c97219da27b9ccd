import type { Report } from '@/lib/formability/report';
import type { Agreed } from '@/lib/review/load-agreed';
import { verdictWords } from '@/lib/review/verdict-words';

/** All that the certificate says, and nothing that it must look up. */
export type CertificateModel = {
  studioName: string;
  workspaceName: string;
  /** Zone of the workspace, for the dates that carry no zone of a signer. */
  timeZone: string;
  agreed: Agreed;
  release: { byName: string; at: string; note: string };
  /** PNG of the template; null where none was drawn. */
  picture: Uint8Array | null;
  meshFileInPack: string;
};

export const reportOf = ({ agreed }: CertificateModel) => agreed.report.body as unknown as Report;

/** Day in the workspace's zone, as ISO 8601: the date of issue. */
export const dayOf = (instant: string, timeZone: string) =>
  new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(
    new Date(instant),
  );

/** Those who signed; whoever returned it is not in an approved revision. */
export const signersOf = ({ agreed }: CertificateModel) =>
  agreed.signatures.filter(({ decision }) => decision === 'sign');

/** What the checks say altogether, with waivers and checks not run named. */
export const verdictSentence = ({ agreed }: CertificateModel): string =>
  verdictWords(
    agreed.lock.docket.findings.map(({ status, waiver }) => ({ status, waived: waiver !== null })),
  );
