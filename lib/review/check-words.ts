/** What a check is called, and what its figures are computed from, for pages, mails and the certificate. */
interface CheckWords {
  name: string;
  /** One sentence for "how it is computed". */
  computed: string;
}

const words: Record<string, CheckWords> = {
  mesh: {
    name: 'Mesh',
    computed:
      'Every facet is read, and the facets that meet along an edge are counted: closed or not, turned outward or not, in which unit, and how the part stands on the bed.',
  },
  fit: {
    name: 'Fit on the machine',
    computed:
      'The mesh’s size in plan and height, with the frame margin all round, is held against the forming area and greatest height of the recipe’s machine.',
  },
  draft: {
    name: 'Draft',
    computed:
      'Each facet of a wall is measured against the pull direction; a wall made of printed steps or scan noise is measured as a whole, over more than 1 mm. Unsanded layers add to the draft that is wanted what the grooves between the beads ask for.',
  },
  undercut: {
    name: 'Undercut',
    computed:
      'From above, along the pull direction, the surface that cannot be seen is found, and how far it reaches in sideways. Shallower than the limit it counts as texture.',
  },
  layers: {
    name: 'Layer lines',
    computed: 'The step that each layer leaves follows from the layer height and the slope of each facet.',
  },
  edges: {
    name: 'Edges and corners',
    computed:
      'The angle between neighbouring facets and the distance over which they turn give the radius of edges and inside corners, 0 where they meet sharply; the least one is held against the sheet’s gauge.',
  },
  spacing: {
    name: 'Spacing',
    computed:
      'Between neighbouring parts of the template the gap at the bed is measured, and the height of the lower one is divided by it.',
  },
  draw: {
    name: 'Draw ratio',
    computed:
      'The area of sheet over the template is divided by the area of the frame opening, the longest section by the frame’s width, and the height by the frame’s shorter side; gauge over the first of them is the sheet’s mean thickness.',
  },
  sheet: {
    name: 'Formed sheet',
    computed:
      'The sheet is lowered over the template as a rubber-like membrane, pressed on and held where it touches; its thickness is read everywhere as the mean over 3 mm. The part is judged above the foot along the bed, where it is usually trimmed. Slip, cooling and the sheet’s bending are left out.',
  },
  air: {
    name: 'Trapped air',
    computed:
      'The air in each pocket and the openings of its vents give the time that it needs to leave as the sheet closes.',
  },
  vents: {
    name: 'Vents',
    computed:
      'Bores through to the bed are found in the mesh; the recipe’s hole model turns the drawn diameter into the printed one. A pocket without an open vent traps air.',
  },
  shell: {
    name: 'Shell',
    computed:
      'Shell and top come from the recipe, or are measured where the mesh itself is hollow, and are held against the template’s size.',
  },
  skin: {
    name: 'Skin over the infill',
    computed: 'The top is a plate between infill lines, as soft as the sheet’s heat makes it.',
  },
  walls: {
    name: 'Walls under pressure',
    computed: 'Hollow walls are plates between ribs, or rings, under the forming pressure.',
  },
  heat: {
    name: 'Heat',
    computed:
      'The heat of each sheet that touches the template is added up over the planned pulls and held against the filament’s softening.',
  },
  nozzle: {
    name: 'Nozzle',
    computed:
      'The template’s length in plan, its thinnest measured wall and its narrowest gap say how wide a nozzle may be; the recipe’s nozzle is held against that.',
  },
  overhang: {
    name: 'Overhang',
    computed:
      'Facets that look down are measured against the vertical, with the template printed as it stands on the bed.',
  },
  release: {
    name: 'Release',
    computed:
      'Least draft, depth, overhangs and the finish of the walls together say whether an agent is advised.',
  },
  print: {
    name: 'Print',
    computed:
      'Volume inside shell, top and infill, divided by what the nozzle lays in a second, and a little time for each layer; the recipe’s rates make it a cost.',
  },
};

/** The engine's own id where a check is newer than this list. */
export const checkName = (checkId: string): string => words[checkId]?.name ?? checkId;

/** What the figures of a check are computed from, as a sentence; null for one that this list does not know. */
export const checkComputed = (checkId: string): string | null => words[checkId]?.computed ?? null;

const stages: Record<string, string> = {
  reading: 'Fetching the file',
  parse: 'Reading the mesh',
  mesh: 'Looking over the mesh',
  columns: 'Looking from above',
  vents: 'Looking for vents',
  air: 'Following the air',
  undercut: 'Looking for undercuts',
  sort: 'Sorting the facets',
  pits: 'Looking for pockets',
  facets: 'Measuring the facets',
  walls: 'Measuring the walls',
  draft: 'Measuring the draft',
  sections: 'Measuring edges and sizes',
  sheet: 'Forming the sheet',
  physics: 'Reckoning heat, air and pressure',
  checks: 'Making the checks',
  advice: 'Trying changes',
  geometry: 'Drawing the maps',
  model: 'Making the model for the page',
  picture: 'Drawing the picture',
};

/** What a check run is doing, in words; the stage's own name where it is newer than this list. */
export const stageName = (stage: string): string => stages[stage] ?? stage;
