import { Text, View } from '@react-pdf/renderer';
import { zonedTime } from '@/lib/time/zoned-time';
import { signersOf, type CertificateModel } from './certificate-model';
import { drawable } from './fonts';
import { styles } from './styles';

const firstColumn = 122;
const secondColumn = 128;

/** Who put their name to it: printed name, role, meaning, date and time with zone, and the digest that was signed. */
export function SignaturesTable({ model }: { model: CertificateModel }) {
  const signers = signersOf(model);
  const locked = model.agreed.lock.contentDigest;
  return (
    <View>
      <Text style={styles.h2}>Signatures</Text>
      <View style={[styles.row, styles.headLine]}>
        <Text style={[styles.label, { width: firstColumn }]}>Printed name, role</Text>
        <Text style={[styles.label, { width: secondColumn }]}>Date and time</Text>
        <Text style={[styles.label, { flex: 1 }]}>Gate and meaning</Text>
      </View>
      {signers.map((one) => (
        <View key={one.id} style={styles.line} wrap={false}>
          <View style={styles.row}>
            <View style={{ width: firstColumn, paddingRight: 8 }}>
              <Text style={styles.strong}>{drawable(one.printedName)}</Text>
              <Text style={styles.muted}>
                {drawable(one.signedFor ? `${one.role}, for ${one.signedFor.name}` : one.role)}
              </Text>
            </View>
            <Text style={[styles.figures, { width: secondColumn, paddingRight: 8, paddingTop: 1 }]}>
              {zonedTime(one.signedAt, model.timeZone).replace(' (', '\n(')}
            </Text>
            <Text style={{ flex: 1 }}>
              <Text style={styles.strong}>{drawable(one.gateName)}. </Text>
              {drawable(one.meaning)}
            </Text>
          </View>
          <Text style={[styles.muted, { fontSize: 7.5, marginTop: 2 }]}>
            {one.contentDigest === locked
              ? 'Signed the content digest of this certificate.'
              : `Signed before later notes joined the docket, on content ${one.contentDigest.slice(0, 16)}…, which is in the pack.`}
          </Text>
        </View>
      ))}
      {signers.length === 0 && (
        <Text style={styles.line}>No person signs under this gate plan; its gates are automatic.</Text>
      )}
      <Text style={[styles.muted, { fontSize: 7.5, marginTop: 3 }]}>
        Electronic signatures (simple), each given with the signer’s password on the content shown to them. A
        “?” stands for a character that the fonts of this sheet lack; signatures.json has every name exactly.
      </Text>
    </View>
  );
}
