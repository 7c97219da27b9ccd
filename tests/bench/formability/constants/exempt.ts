import type { Constant } from './find-constants';

interface Exemption {
  reason: string;
  files: RegExp;
  /** Names, whole or their beginning; all of the files' where left out. */
  names?: RegExp;
  is?: (constant: Constant) => boolean;
}

/**
 * What no test holds to 1 %, each group with its reason; everything else must be held. These choose how a figure is
 * found, not what it is: moved by 1 % they leave it within its stated tolerance.
 */
const EXEMPT: Exemption[] = [
  {
    reason:
      'guard against rounding: anything from the rounding of doubles up to the smallest length that counts serves',
    files: /^(?!physics|recipe)/,
    is: ({ value, name }) =>
      value <= 1e-6 && Number.isInteger(Math.log10(value)) && !/NEEDLE|VOLUME/.test(name),
  },
  {
    reason: 'share of the progress bar, or width of the printed summary',
    files: /^(stages|summarise|cli|inspect)\.ts$/,
  },
  {
    reason:
      'bound on work or on a list that only rough meshes of very many facets reach; tried whole by `npm run test:hostile`',
    files: /^(mesh|measures|dexel)\//,
    names:
      /^(MOST_(?!LEAN|MM)|ALL_FACETS|LARGE_MESH|LEAST_PAIRS|MANY_FACETS|WORTH_SORTING|ENOUGH_HITS|STRAY_COLUMNS|COLUMNS_AGREE)/,
  },
  {
    reason: 'number of samples, rays, cells, buckets or halvings, or where samples lie: more only refine',
    files: /^(mesh|measures|dexel)\/|^sheet\/(find-thinnest|form-sheet)/,
    names:
      /^(RAYS|SPACING_MM|MOST_PARTS|SEARCHED|USUAL_NODES|PREVIEW_NODES|BED_RAYS|FOLLOWED|HALVINGS|FINER|FEW_CELLS|FINE_MM|BINS_A_DEG|COARSE|CELLS|MAP|BUCKETS|LEAF|AXIS_CELLS|ITEM_SPAN|CELL\b|BITS|GAPS|SHIFT|USUAL_CELLS|VISIBLE|SMALL_CELLS|DIRECTIONS|CROSSING_STEPS|sampleSurface|sortColumn|sortByHeight|sortTriangles|isLocal|mortonOrder|noise|perturbMesh|keyOf|share|spread|sumCells|affordGrid|SHELL_SHIFT|VERTEX_SHIFT|COARSE_STEP_MM|HEIGHTS)/,
  },
  {
    reason:
      'step, damping, tolerance or cap of the membrane’s solver: its results are held against the differential equation, volume and refinement',
    files:
      /^sheet\/(relax|multigrid|plan-drape|drape-and-press|obstacle|snap-to-plateau|close-leftovers|add-forces|measure-elements|inflate-disc|thickness-at|sheet-input|sheet-surface)\.ts$/,
  },
  {
    reason:
      'quadrature, cells, terms or cap of a series: the sums are held to the digits of the handbook’s rows',
    files:
      /^physics\/(clamped-rectangle|conduct|conduction|erf|follow-pulls|inflate-membrane|layer-surface|plates)\.ts$|^sheet\/thinning-rules\.ts$/,
    names:
      /^(TERMS|POINTS|STEPS|gaussPoints|toolC|MOST_KNOWN|SERIES_TO|series|fraction|SHEET_CELLS|TOOL_CELLS|FIRST_CELL|FIRST_STEP|ALIKE_K|MOST_PULLS|COARSE|ROUGH|inflateMembrane|integrate|MOST_STEPS|atRim|meridianStretch|heightAtPressure|supportedRectangle$|NAVIER|stepTimes|shareThrough|stateAtPressure|growing)/,
  },
  {
    reason: 'bound of a search, or how finely it ends: the answer is rounded more coarsely',
    files: /^(measures|sheet)\//,
    names: /^(cycleThatHolds|widestThatHolds|measureGap|MOST_RUNS|MOST_FACTOR)/,
  },
  {
    reason:
      'bounds, rounds and coefficients of a fit: Lanczos’ series holds 15 digits, of which tests need 6',
    files: /^life\/fit-weibull/,
    names: /^(LANCZOS|\[LEAST_SHAPE|fitWeibull)/,
  },
  {
    reason: 'limit on time, memory or a buffer of a reader: read from the machine, not from the part',
    files: /^parse\//,
    names:
      /^(convertStep|GRACE_MS|MOST_HEAD|EDGE|STEP\b|room|unpack|MAX_(PART|TOTAL|RELATIONS|TAG|FILE|STEP)_?BYTES|MAX_(ENTRIES|OBJECTS|COMPONENTS|PLACED|TRIANGLES)|LEAST_FACET_BYTES)/,
  },
];

export function exemptionOf(constant: Constant): string | null {
  const found = EXEMPT.find(
    ({ files, names, is }) =>
      files.test(constant.file) && (!names || names.test(constant.name)) && (!is || is(constant)),
  );
  return found?.reason ?? null;
}
