import { renderToBuffer } from '@react-pdf/renderer';
import { Certificate } from './certificate';
import type { CertificateModel } from './certificate-model';
import { registerFonts } from './fonts';

/** The certificate as PDF bytes, fonts embedded; dated by the release, so that building it again gives the same. */
export async function renderCertificate(model: CertificateModel): Promise<Uint8Array> {
  registerFonts();
  return renderToBuffer(<Certificate model={model} />);
}
