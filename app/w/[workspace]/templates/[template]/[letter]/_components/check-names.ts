/** What each check is called on the page; the engine's ids are the keys. */
const names: Record<string, string> = {
  mesh: 'Mesh',
  fit: 'Fit on the machine',
  draft: 'Draft',
  undercut: 'Undercut',
  layers: 'Layer lines',
  edges: 'Edges and corners',
  spacing: 'Spacing',
  draw: 'Draw ratio',
  sheet: 'Formed sheet',
  air: 'Trapped air',
  vents: 'Vents',
  shell: 'Shell',
  skin: 'Skin over the infill',
  walls: 'Walls under pressure',
  heat: 'Heat',
  nozzle: 'Nozzle',
  overhang: 'Overhang',
  release: 'Release',
  print: 'Print',
};

export function checkName(checkId: string): string {
  return names[checkId] ?? checkId;
}
