import { Document, Image as PdfImage, Page, Text, View } from '@react-pdf/renderer';
import { zonedTime } from '@/lib/time/zoned-time';
import { recipeLines } from '@/lib/review/recipe-lines';
import { formingCautions } from '../cautions';
import { reportOf, verdictSentence, type CertificateModel } from './certificate-model';
import { FindingsTable } from './findings-table';
import { drawable } from './fonts';
import { Mark } from './shapes';
import { SignaturesTable } from './signatures-table';
import { hairline, ink, ochre, paper, slate, styles } from './styles';
import { TitleBlock } from './title-block';
import { figure, grouped } from './words';

/** The readable form of what was agreed and released. Everything in it stands in the pack's JSON files too. */
export function Certificate({ model }: { model: CertificateModel }) {
  const { agreed, release } = model;
  const issued = new Date(release.at);
  return (
    <Document
      title={`${agreed.template.number} ${agreed.revision.letter}: certificate of agreement`}
      author={model.studioName}
      subject={agreed.template.title}
      creator="Firstpull"
      producer="Firstpull"
      language="en"
      creationDate={issued}
      modificationDate={issued}
    >
      <Page size="A4" style={styles.page}>
        <View>
          <Head model={model} />
          <View style={[styles.row, { marginTop: 12 }]}>
            <Picture picture={model.picture} />
            <Facts model={model} />
          </View>
          <SignaturesTable model={model} />
          <DigestLine model={model} />
        </View>
        <TitleBlock model={model} />
        <Foot model={model} />
      </Page>
      <Page size="A4" style={styles.page}>
        <Verdict model={model} />
        <FindingsTable findings={agreed.lock.docket.findings} timeZone={model.timeZone} />
        <RecipeTable model={model} />
        <Notes model={model} />
        <Verify model={model} />
        <Cautions />
        <Foot model={model} />
      </Page>
    </Document>
  );
}

function Verdict({ model }: { model: CertificateModel }) {
  return (
    <View>
      <Text style={[styles.h2, { marginTop: 0 }]}>Checks for forming</Text>
      <Text style={[styles.muted, { marginBottom: 6 }]}>
        {verdictSentence(model)} Engine {model.agreed.report.engineVersion}, on exactly the mesh and recipe of
        this certificate.
      </Text>
    </View>
  );
}

function Head({ model }: { model: CertificateModel }) {
  const { template, revision } = model.agreed;
  return (
    <View>
      <View
        style={[
          styles.row,
          { alignItems: 'center', borderBottomWidth: 1.1, borderBottomColor: ink, paddingBottom: 7 },
        ]}
      >
        <Mark />
        <Text style={[styles.strong, { fontSize: 12, marginLeft: 7 }]}>Firstpull</Text>
        <Text style={[styles.muted, { marginLeft: 'auto' }]}>Certificate of agreement</Text>
      </View>
      <Text style={[styles.h1, { marginTop: 14 }]}>
        {drawable(`${template.title}, revision ${revision.letter}`)}
      </Text>
      <Text style={[styles.lead, { marginTop: 5 }]}>
        {drawable(
          `${model.workspaceName} and ${model.studioName} agreed on this forming template. What was agreed is locked: mesh, recipe, report, docket and signatures. ${model.release.byName} released it to production on ${zonedTime(model.release.at, model.timeZone)}.`,
        )}
      </Text>
    </View>
  );
}

function Picture({ picture }: { picture: Uint8Array | null }) {
  return (
    <View style={{ width: 290, height: 194, borderWidth: 0.6, borderColor: ink, backgroundColor: paper }}>
      {picture ? (
        <PdfImage
          src={{ data: Buffer.from(picture), format: 'png' }}
          style={{ width: 288.8, height: 192.8, objectFit: 'contain' }}
        />
      ) : (
        <Text style={[styles.muted, { margin: 'auto' }]}>No picture was drawn of this mesh.</Text>
      )}
    </View>
  );
}

function Facts({ model }: { model: CertificateModel }) {
  const { agreed } = model;
  const report = reportOf(model);
  const { min, max } = report.mesh.boundsMm;
  const size = [0, 1, 2].map((axis) => (max[axis] - min[axis]).toFixed(1)).join(' × ');
  const recipe = new Map(recipeLines(agreed.recipe.body).map(({ label, value }) => [label, value]));
  const rows: [string, string][] = [
    ['Mesh', model.meshFileInPack],
    ['Bytes', grouped(agreed.mesh.bytes)],
    ['Triangles', grouped(agreed.mesh.triangles)],
    ['Size', `${size}\u00a0mm`],
    ['Sheet', recipe.get('Sheet') ?? ''],
    ['Template', `${recipe.get('Filament')}, ${recipe.get('Layer height') ?? ''} layers`],
    ['Least draft', figure(report.draft.minUpFacingDeg, 'deg')],
    ['Draw ratio, areal', figure(report.plan.arealDrawRatio, '')],
    ['Checks', verdictSentence(model)],
  ];
  return (
    <View style={{ flex: 1, marginLeft: 16 }}>
      {rows.map(([label, value], at) => (
        <View
          key={label}
          style={[
            styles.row,
            { paddingVertical: 2.7, borderTopWidth: at ? 0.6 : 0.9, borderTopColor: at ? hairline : ink },
          ]}
        >
          <Text style={[styles.label, { width: 62, paddingTop: 1 }]}>{label}</Text>
          <Text style={{ flex: 1 }}>{drawable(value)}</Text>
        </View>
      ))}
    </View>
  );
}

function DigestLine({ model }: { model: CertificateModel }) {
  const { contentDigest, lockedAt } = model.agreed.lock;
  return (
    <View style={{ marginTop: 14 }} wrap={false}>
      <Text style={styles.label}>
        Content digest (SHA-256 of content.json in this pack), locked {zonedTime(lockedAt, model.timeZone)}
      </Text>
      <Text style={[styles.figures, { fontSize: 8.4, marginTop: 2 }]}>{contentDigest}</Text>
      <Text style={[styles.label, { marginTop: 6 }]}>Mesh (SHA-256 of its exact bytes)</Text>
      <Text style={[styles.figures, { fontSize: 8.4, marginTop: 2 }]}>{model.agreed.mesh.sha256}</Text>
    </View>
  );
}

function RecipeTable({ model }: { model: CertificateModel }) {
  const rows = recipeLines(model.agreed.recipe.body);
  const half = Math.ceil(rows.length / 2);
  return (
    <View wrap={false}>
      <Text style={styles.h2}>Recipe</Text>
      <View style={styles.row}>
        {[rows.slice(0, half), rows.slice(half)].map((column, at) => (
          <View key={at} style={{ flex: 1, marginLeft: at ? 22 : 0 }}>
            {column.map(({ label, value }) => (
              <View key={label} style={[styles.row, styles.line, { paddingVertical: 2.5 }]}>
                <Text style={[styles.muted, { width: 100 }]}>{label}</Text>
                <Text style={{ flex: 1 }}>{drawable(value)}</Text>
              </View>
            ))}
          </View>
        ))}
      </View>
    </View>
  );
}

function Notes({ model }: { model: CertificateModel }) {
  const threads = model.agreed.lock.docket.threads.filter(({ afterApproval }) => !afterApproval);
  const open = threads.filter(({ state }) => state === 'open');
  const settled = threads.length - open.length;
  const sentence =
    threads.length === 0
      ? 'No notes stood on the docket when the revision was locked.'
      : `${threads.length} ${threads.length === 1 ? 'thread' : 'threads'} of notes stood on the docket when the revision was locked: ${settled} settled, ${open.length} open. docket.json has every word.`;
  return (
    <View>
      <Text style={styles.h2}>Notes</Text>
      <Text>{sentence}</Text>
      {open.map((thread) => (
        <Text key={thread.id} style={{ marginTop: 2 }}>
          {drawable(`Open: ${thread.openedByName}: ${thread.notes[0]?.text ?? ''}`.slice(0, 300))}
        </Text>
      ))}
      {model.release.note !== '' && (
        <Text style={{ marginTop: 2 }}>
          {drawable(`With the release, ${model.release.byName}: ${model.release.note}`)}
        </Text>
      )}
    </View>
  );
}

function Verify({ model }: { model: CertificateModel }) {
  return (
    <View wrap={false}>
      <Text style={styles.h2}>To check this pack</Text>
      <Text>
        In the unpacked folder run <Text style={styles.figures}>sha256sum -c SHA256SUMS</Text>: every line
        must say OK. Then <Text style={styles.figures}>sha256sum content.json</Text> must give the content
        digest on sheet 1, and content.json names the sum of {drawable(model.meshFileInPack)}. With Node.js,{' '}
        <Text style={styles.figures}>node check-pack.mjs</Text> does all of it and names whatever was changed.
        README.txt says the same at length.
      </Text>
    </View>
  );
}

function Cautions() {
  return (
    <View style={styles.caution} wrap={false}>
      <Text style={[styles.strong, { color: ochre, marginBottom: 2 }]}>Before anyone acts on this</Text>
      {formingCautions.map((text) => (
        <View key={text} style={[styles.row, { marginTop: 1.5 }]}>
          <Text style={{ width: 9 }}>–</Text>
          <Text style={{ flex: 1 }}>{text}</Text>
        </View>
      ))}
    </View>
  );
}

function Foot({ model }: { model: CertificateModel }) {
  const { template, revision, lock } = model.agreed;
  const name = drawable(`${template.number} ${revision.letter}, content ${lock.contentDigest.slice(0, 16)}…`);
  return (
    <Text
      fixed
      style={{ position: 'absolute', left: 42, right: 42, bottom: 22, fontSize: 7.5, color: slate }}
      render={({ pageNumber, totalPages }) => `Sheet ${pageNumber} of ${totalPages}, ${name}`}
    />
  );
}
