import { Text, View } from '@react-pdf/renderer';
import { checkName } from '@/lib/review/check-words';
import type { DocketView } from '@/lib/review/schemas';
import { zonedTime } from '@/lib/time/zoned-time';
import { drawable } from './fonts';
import { StatusShape } from './shapes';
import { madder, statusColour, styles } from './styles';
import { figure, statusWord } from './words';

type Finding = DocketView['findings'][number];
const columns = { name: 92, status: 64, measured: 54, limit: 54 };

/** Every check with what was measured, its limit and the basis of the limit; waivers where they belong. */
export function FindingsTable({ findings, timeZone }: { findings: Finding[]; timeZone: string }) {
  const run = findings.filter(({ status }) => status !== 'not-run');
  return (
    <>
      <View>
        <View style={[styles.row, styles.headLine]} fixed>
          <Text style={[styles.label, { width: columns.name }]}>Check</Text>
          <Text style={[styles.label, { width: columns.status }]}>Result</Text>
          <Text style={[styles.label, { width: columns.measured }]}>Measured</Text>
          <Text style={[styles.label, { width: columns.limit }]}>Limit</Text>
          <Text style={[styles.label, { flex: 1 }]}>Finding and basis of the limit</Text>
        </View>
        {run.map((finding) => (
          <FindingRow key={finding.id} finding={finding} timeZone={timeZone} />
        ))}
      </View>
      <NotRun findings={findings.filter(({ status }) => status === 'not-run')} />
    </>
  );
}

function NotRun({ findings }: { findings: Finding[] }) {
  if (findings.length === 0) return null;
  return (
    <View style={[styles.row, styles.line]} wrap={false}>
      <StatusShape status="not-run" />
      <Text style={{ flex: 1 }}>
        <Text style={styles.strong}>Not run by this engine version: </Text>
        {findings.map(({ checkId }) => checkName(checkId)).join(', ')}. Nothing is said about them here; the
        test pull must show them.
      </Text>
    </View>
  );
}

function FindingRow({ finding, timeZone }: { finding: Finding; timeZone: string }) {
  const { checkId, status, measured, limit, unit, message, remedy, basis, waiver } = finding;
  const numbers = { ...styles.figures, paddingTop: 1.5 };
  return (
    <View style={[styles.row, styles.line]} wrap={false}>
      <Text style={[styles.strong, { width: columns.name, paddingRight: 6 }]}>{checkName(checkId)}</Text>
      <View style={[styles.row, { width: columns.status }]}>
        <StatusShape status={status} />
        <Text style={{ color: statusColour[status] }}>{statusWord[status] ?? status}</Text>
      </View>
      <Text style={[numbers, { width: columns.measured }]}>{drawable(figure(measured, unit))}</Text>
      <Text style={[numbers, { width: columns.limit }]}>{drawable(figure(limit, unit))}</Text>
      <View style={{ flex: 1 }}>
        <Text>{drawable(message)}</Text>
        {status !== 'pass' && remedy !== '' && <Text>{drawable(remedy)}</Text>}
        <Text style={[styles.muted, { fontSize: 7.5 }]}>Basis: {drawable(basis.source)}</Text>
        {waiver && (
          <Text style={{ color: madder }}>
            {drawable(`Let stand by ${waiver.by}, ${zonedTime(waiver.at, timeZone)}: ${waiver.reason}`)}
          </Text>
        )}
      </View>
    </View>
  );
}
