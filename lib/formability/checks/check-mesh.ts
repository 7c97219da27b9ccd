import type { Check, MeshPlace, MeshReport, MeshWarning, Place } from '../report';
import { say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** How much hangs on a warning: figures or the stand of the part, the soundness of the model, or nothing. */
type Weight = 'grave' | 'unsound' | 'note';

interface Meaning {
  weight: Weight;
  /** What was seen, for a designer; `count` is how many edges, facets or bodies, `span` how wide, in mm. */
  says(count: number, span: number): string;
  /** What to do in the model; empty where nothing need be done. */
  todo: string;
}

const many = (count: number, one: string, more: string) => (count === 1 ? `one ${one}` : `${count} ${more}`);

const MEANING: Record<MeshWarning, Meaning> = {
  trailing_data: { weight: 'note', says: () => 'bytes follow after the last facet', todo: 'export the file again' },
  normals_disagree: { weight: 'note', says: (n) => `the normals written in the file point another way than ${many(n, 'facet', 'of its facets')}; the facets count`, todo: '' },
  inverted: { weight: 'unsound', says: (n) => `${many(n, 'body was', 'bodies were')} inside out`, todo: 'export with normals outward' },
  inconsistent_winding: { weight: 'unsound', says: (n) => `facets face against their neighbours along ${many(n, 'edge', 'edges')}`, todo: 'unify the normals' },
  not_watertight: { weight: 'grave', says: (n, span) => `the surface is open along ${many(n, 'edge', 'edges')}, the widest gap ${say(span, 2)} mm across`, todo: 'close the surface' },
  nonmanifold_edge: { weight: 'unsound', says: (n) => `more than two facets meet in ${many(n, 'edge', 'edges')}`, todo: 'unite the bodies, or part them' },
  overlapping_shells: { weight: 'unsound', says: () => 'bodies overlap; what they share counts once', todo: 'unite them into one body' },
  touching_shells: { weight: 'unsound', says: () => 'bodies touch without being joined', todo: 'unite them into one body, or leave a gap' },
  self_intersection: { weight: 'unsound', says: () => 'the surface goes through itself; what it covers twice counts once', todo: 'unite the body with itself, or redraw it there' },
  suspicious_scale: { weight: 'grave', says: () => 'the size is not that of a template', todo: 'choose the right unit' },
  degenerate_triangles: { weight: 'note', says: (n) => `${many(n, 'facet has', 'facets have')} no area`, todo: '' },
  duplicate_triangles: { weight: 'unsound', says: (n) => `${many(n, 'facet occurs', 'facets occur')} twice; each counts once`, todo: 'delete the second copy' },
  needs_tolerant_weld: { weight: 'note', says: (n) => `${many(n, 'corner misses its', 'corners miss their')} neighbour by less than 0.0001 mm`, todo: '' },
  t_junction: { weight: 'unsound', says: (n) => `${many(n, 'corner lies', 'corners lie')} on a neighbour's edge that has no corner there`, todo: 'mesh the body again in one piece' },
  floating: { weight: 'grave', says: (n) => `${many(n, 'body hangs', 'bodies hang')} in the air`, todo: 'join it to the part, or set it on the bed' },
  below_bed: { weight: 'grave', says: (_, deep) => `the part reaches ${say(deep, 2)} mm below the bed`, todo: 'raise it, or let it be dropped to the bed' },
  orientation: { weight: 'unsound', says: () => 'the part does not stand on its best base', todo: 'turn it' },
  precision: { weight: 'unsound', says: () => 'the part lies so far from the origin that its shape is blurred', todo: 'move it to the origin and export again' },
  too_large: { weight: 'note', says: () => 'the mesh is very large', todo: 'export with a coarser tolerance' },
}; // prettier-ignore

const IN_WORDS: Record<MeshReport['repairs'][number], string> = {
  tolerant_weld: 'near corners were welded',
  flipped_inside_out: 'bodies were turned right side out',
  rewound_facets: 'facets were turned to face outward',
  removed_degenerate: 'facets without area were left out',
  removed_duplicates: 'second copies of facets were left out',
  split_at_t_junctions: 'edges were split where a corner lies on them',
  dropped_to_bed: 'the part was set on the bed',
  capped_holes: 'holes were closed with flat caps',
  closed_at_bed: 'the open underside was closed at the bed',
  filled_columns: 'gaps were filled from what lies beside them',
};

/** Places named in the message and listed with the check. */
const MOST_LISTED = 24;

/** Is the mesh sound, in the right unit, standing on the bed? */
export function checkMesh({ report }: CheckInput): Check {
  const { mesh } = report;
  const found = mesh.warnings.map((code) => ({
    code,
    weight: weightOf(code, mesh),
    ...figuresOf(code, mesh),
  }));
  const told = [...found].sort((a, b) => RANK[a.weight] - RANK[b.weight]);
  const serious = told.filter(({ weight }) => weight !== 'note');
  const todo = told.map(({ code }) => remedyFor(code, mesh)).filter((text) => text !== '');
  const sentences = told.map(({ code, count, span, first }) => {
    const where = first ? ` (first at ${sayPlace(first)} mm)` : '';
    return `${codeSays(code, count, span, mesh)}${where}`;
  });
  const mended = mesh.repairs.length > 0 ? ` Before measuring, ${mesh.repairs.map((code) => IN_WORDS[code]).join('; ')}.` : ''; // prettier-ignore
  const estimate = mesh.approximate
    ? ' Volumes and areas in plan are estimates until the surface is closed.'
    : '';
  return {
    id: 'mesh',
    status: serious.some(({ weight }) => weight === 'grave')
      ? 'fail'
      : serious.length > 0
        ? 'caution'
        : 'pass',
    measured: serious.length,
    limit: 0,
    unit: 'warnings',
    basis: {
      source: '3MF core specification §4.1: every edge shared by two facets, outward normals',
      kind: 'standard',
    },
    message:
      serious.length > 0
        ? `The mesh is not quite sound: ${sentences.join('; ')}.${mended}${estimate}`
        : `The mesh is closed, faces outward and stands on the bed.${sentences.length > 0 ? ` Noted: ${sentences.join('; ')}.` : ''}${mended}`,
    remedy: todo.length > 0 ? `In the model: ${todo.join('; ')}.` : '',
    places: listPlaces(
      mesh.places,
      told.map(({ code }) => code),
    ),
  };
}

const RANK: Record<Weight, number> = { grave: 0, unsound: 1, note: 2 };

/** A fault that was mended whole weighs less: an open surface that a split closed, a part that was set on the bed. */
function weightOf(code: MeshWarning, mesh: MeshReport): Weight {
  const dropped = mesh.repairs.includes('dropped_to_bed');
  if (code === 'not_watertight' && !mesh.approximate) return 'unsound';
  if (code === 'below_bed' && dropped) return 'note';
  if (code === 'floating' && dropped && bodiesInTheAir(mesh) === 0) return 'note';
  return MEANING[code].weight;
}

/** A part that floats as a whole has its place at its own lowest point, 0 once it was dropped; a body hangs higher. */
function bodiesInTheAir(mesh: MeshReport): number {
  return mesh.places.filter((place) => place.code === 'floating' && place.at[2] > 1e-4).length;
}

function figuresOf(
  code: MeshWarning,
  mesh: MeshReport,
): { count: number; span: number; first: Place['at'] | null } {
  const places = mesh.places.filter((place) => place.code === code);
  const counted = places.reduce((sum, place) => sum + place.count, 0);
  const whole: Partial<Record<MeshWarning, number>> = {
    not_watertight: mesh.edges.boundary,
    nonmanifold_edge: mesh.edges.nonManifold,
    inconsistent_winding: mesh.edges.inconsistent,
    degenerate_triangles: mesh.degenerate,
    duplicate_triangles: mesh.duplicates,
  };
  const span = places.reduce((most, place) => Math.max(most, place.sizeMm), 0);
  return { count: whole[code] ?? Math.max(1, counted), span, first: places[0]?.at ?? null };
}

function codeSays(code: MeshWarning, count: number, span: number, mesh: MeshReport): string {
  if (mesh.repairs.includes('dropped_to_bed')) {
    if (code === 'floating' && bodiesInTheAir(mesh) === 0)
      return `the file has the part ${say(span, 2)} mm above the bed`;
    if (code === 'below_bed') return `the file has the part ${say(span, 2)} mm below the bed`;
  }
  return MEANING[code].says(count, span);
}

function remedyFor(code: MeshWarning, mesh: MeshReport): string {
  if (weightOf(code, mesh) === 'note' && (code === 'floating' || code === 'below_bed')) return '';
  const { suggestedScale: scale, suggestedUp: up } = mesh;
  if (code === 'suspicious_scale' && scale !== null)
    return `scale by ${say(scale, 4)}, or choose the unit that does`;
  if (code === 'orientation' && up)
    return `stand it with the direction ${up.map((value) => say(value, 3)).join(', ')} up`;
  return MEANING[code].todo;
}

/** The gravest first, a few of each; a place of edges or bodies has no area. */
function listPlaces(places: readonly MeshPlace[], order: readonly MeshWarning[]): Place[] {
  return [...places]
    .sort((a, b) => order.indexOf(a.code) - order.indexOf(b.code))
    .slice(0, MOST_LISTED)
    .map(({ at }) => ({ at, areaMm2: 0 }));
}
