import type { Check, MeshWarning } from '../report';
import { say } from './basis';
import type { CheckInput } from './check-input';

/** Each warning in a client's words, what to do, and whether figures or fit hang on it. */
const MEANING: Record<MeshWarning, { says: string; todo: string; grave: boolean }> = {
  trailing_data: { says: 'bytes follow after the last facet', todo: 'export the mesh again', grave: false },
  normals_disagree: { says: 'stored normals point another way than the facets', todo: 'nothing: they are ignored', grave: false },
  inverted: { says: 'the surface was inside out', todo: 'export with normals outward', grave: false },
  inconsistent_winding: { says: 'some facets face the wrong way', todo: 'unify the normals', grave: false },
  not_watertight: { says: 'the surface has open edges', todo: 'close the holes', grave: true },
  nonmanifold_edge: { says: 'some edges carry more than two facets', todo: 'merge the bodies into one', grave: false },
  overlapping_shells: { says: 'bodies overlap', todo: 'unite them; here they count once', grave: false },
  touching_shells: { says: 'bodies touch without being joined', todo: 'unite them', grave: false },
  self_intersection: { says: 'the surface cuts itself', todo: 'repair it; doubly covered solid counts once', grave: false },
  suspicious_scale: { says: 'the size is not that of a template', todo: 'choose the right unit', grave: true },
  degenerate_triangles: { says: 'some facets have no area', todo: 'nothing: they are left out', grave: false },
  duplicate_triangles: { says: 'some facets occur twice', todo: 'nothing: they count once', grave: false },
  needs_tolerant_weld: { says: 'corners miss each other by less than 0.0001 mm', todo: 'nothing: they are welded', grave: false },
  t_junction: { says: 'corners lie on the edges of neighbours', todo: 'mesh the body again', grave: false },
  floating: { says: 'a body hangs above the bed', todo: 'join it, or set it down', grave: true },
  below_bed: { says: 'the part reaches below the bed', todo: 'raise it, or let it be dropped to the bed', grave: true },
  orientation: { says: 'the part does not stand on its largest base', todo: 'turn it', grave: false },
  precision: { says: 'the part lies so far from the origin that its shape is blurred', todo: 'move it to the origin and export again', grave: false },
  too_large: { says: 'the mesh is very large', todo: 'export with a coarser tolerance', grave: false },
}; // prettier-ignore

/** Is the mesh sound, in the right unit, standing on the bed? */
export function checkMesh({ report }: CheckInput): Check {
  const { mesh } = report;
  const grave = mesh.warnings.filter((w) => MEANING[w].grave);
  const found = mesh.warnings.map((w) => MEANING[w].says);
  const open = mesh.edges.boundary;
  const scale = mesh.suggestedScale;
  const up = mesh.suggestedUp;
  const todo = mesh.warnings.map((w) => {
    if (w === 'suspicious_scale' && scale !== null) return `scale by ${say(scale, 4)}`;
    if (w === 'not_watertight') return `close the holes (${open} open edges)`;
    if (w === 'orientation' && up) return `stand it with ${up.join(', ')} up`;
    return MEANING[w].todo;
  });
  const mended = mesh.repairs.length > 0 ? ` Mended before measuring: ${mesh.repairs.map((r) => r.replaceAll('_', ' ')).join(', ')}.` : ''; // prettier-ignore
  return {
    id: 'mesh',
    status: grave.length > 0 ? 'fail' : found.length > 0 ? 'caution' : 'pass',
    measured: mesh.warnings.length,
    limit: 0,
    unit: 'warnings',
    basis: {
      source: '3MF core specification §4.1: every edge shared by two facets, outward normals',
      kind: 'standard',
    },
    message:
      found.length > 0
        ? `The mesh is not quite sound: ${found.join('; ')}.${mended}`
        : 'The mesh is closed, faces outward and stands on the bed.',
    remedy: todo.length > 0 ? `In the model: ${todo.join('; ')}.` : '',
    places: [],
  };
}
