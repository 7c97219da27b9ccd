/** The usual cautions of forming, said wherever something is handed to production. Common practice, no source. */
export const formingCautions = [
  'Figures are estimates, to be proven by a test pull: temperatures, times, pressure, thickness and the number of pulls.',
  'Hot sheet, heaters and templates burn. Wear heat-resistant gloves and eye protection, and let parts cool before touching them.',
  'Compressed air and vacuum hurt. Keep hands out of the clamp, and let the pressure off before opening anything.',
  'Heated plastics and release agents give off fumes. Ventilate, and follow the safety data sheets of sheet and filament.',
  'A part that will touch food needs a sheet, a release agent and a process that are cleared for it. This check says nothing about that.',
  'The documents of the machine and the materials, local codes, and the judgement of qualified people come before anything written here.',
] as const;

/** For a short mail: the first, the sharpest and the last. */
export const shortCautions = [formingCautions[0], formingCautions[1], formingCautions[2], formingCautions[5]];
