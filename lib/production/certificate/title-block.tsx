import { Text, View } from '@react-pdf/renderer';
import { dayOf, signersOf, type CertificateModel } from './certificate-model';
import { drawable } from './fonts';
import { hairline, ink, styles } from './styles';

type Cell = { label: string; value: string; grow: number; code?: boolean };

/**
 * The title block at the foot of the first sheet: data fields of ISO 7200:2004, Table 1 and 2 (from memory),
 * as far as a certificate has them. Width 180 mm as there.
 */
export function TitleBlock({ model }: { model: CertificateModel }) {
  const { agreed, studioName, workspaceName, release, timeZone } = model;
  const approvers = signersOf(model)
    .map(({ printedName }) => printedName)
    .join(', ');
  const rows: Cell[][] = [
    [
      { label: 'Legal owner', value: studioName, grow: 3 },
      { label: 'Client', value: workspaceName, grow: 3 },
      { label: 'Document type', value: 'Certificate of agreement', grow: 3 },
      { label: 'Language', value: 'en', grow: 1 },
    ],
    [
      { label: 'Created by', value: agreed.revision.authorName, grow: 3 },
      { label: 'Approved by', value: approvers || 'all gates automatic', grow: 4 },
      { label: 'Status', value: 'Released', grow: 2 },
      { label: 'Sheet', value: '', grow: 1 },
    ],
    [
      { label: 'Title', value: agreed.template.title, grow: 4 },
      { label: 'Identification number', value: agreed.template.number, grow: 3, code: true },
      { label: 'Rev.', value: agreed.revision.letter, grow: 1, code: true },
      { label: 'Date of issue', value: dayOf(release.at, timeZone), grow: 2, code: true },
    ],
  ];
  return (
    <View style={{ borderWidth: 1.1, borderColor: ink, marginTop: 'auto' }} wrap={false}>
      {rows.map((row, at) => (
        <View key={at} style={[styles.row, at ? { borderTopWidth: 0.6, borderTopColor: ink } : {}]}>
          {row.map((cell, index) => (
            <View
              key={cell.label}
              style={{
                flexGrow: cell.grow,
                flexBasis: 0,
                paddingVertical: 4,
                paddingHorizontal: 6,
                borderLeftWidth: index ? 0.6 : 0,
                borderLeftColor: hairline,
              }}
            >
              <Text style={styles.label}>{cell.label}</Text>
              {cell.label === 'Sheet' ? (
                <Text
                  style={styles.figures}
                  render={({ pageNumber, totalPages }) => `${pageNumber} / ${totalPages}`}
                />
              ) : (
                <Text
                  style={[styles.strong, cell.code ? { ...styles.figures, fontSize: 9 } : { fontSize: 9.5 }]}
                >
                  {drawable(cell.value)}
                </Text>
              )}
            </View>
          ))}
        </View>
      ))}
    </View>
  );
}
