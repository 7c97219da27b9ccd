import { defaultRecipe } from '@/lib/formability/recipe';
import type { LibraryInput, LibraryKind } from './schemas';

const { machine, print } = defaultRecipe();

/**
 * What a new studio's shelves hold, so that its first recipe has sensible values: a generic machine, a generic
 * printer, common gauges and template materials (common practice, no source). The studio puts its own in place.
 */
export const startingLibrary: { [K in LibraryKind]: LibraryInput<K>[] } = {
  machines: [
    {
      name: 'Pressure former 450 × 300',
      formingXMm: machine.formingAreaMm[0],
      formingYMm: machine.formingAreaMm[1],
      maxHeightMm: machine.maxHeightMm,
      frameMarginMm: machine.frameMarginMm,
      pressureBar: machine.pressureBar,
      isDefault: true,
    },
  ],
  printers: [
    {
      name: 'Filament printer, 0.4 nozzle',
      buildXMm: 300,
      buildYMm: 300,
      buildZMm: 300,
      nozzleMm: print.nozzleMm,
      layerMm: print.layerMm,
      isDefault: true,
    },
  ],
  sheets: [
    { name: 'PETG 0.5', material: 'petg', gaugeMm: 0.5, minFormedMm: 0.2, isDefault: false },
    { name: 'PETG 0.8', material: 'petg', gaugeMm: 0.8, minFormedMm: 0.35, isDefault: true },
    { name: 'PETG 1.0', material: 'petg', gaugeMm: 1, minFormedMm: 0.4, isDefault: false },
    { name: 'HIPS 1.0', material: 'hips', gaugeMm: 1, minFormedMm: 0.4, isDefault: false },
    { name: 'HIPS 2.0', material: 'hips', gaugeMm: 2, minFormedMm: 0.8, isDefault: false },
    { name: 'APET 0.5', material: 'apet', gaugeMm: 0.5, minFormedMm: 0.2, isDefault: false },
    { name: 'ABS 2.0', material: 'abs', gaugeMm: 2, minFormedMm: 0.8, isDefault: false },
    { name: 'PC 1.0', material: 'pc', gaugeMm: 1, minFormedMm: 0.4, isDefault: false },
  ],
  filaments: [
    { name: 'PA-CF', material: 'pa12-cf', shellMm: 4, topMm: 4, infillPercent: 35, isDefault: true },
    { name: 'PETG', material: 'petg', shellMm: 4, topMm: 4, infillPercent: 40, isDefault: false },
    { name: 'ABS', material: 'abs', shellMm: 4, topMm: 4, infillPercent: 40, isDefault: false },
    { name: 'PC', material: 'pc', shellMm: 4, topMm: 4, infillPercent: 35, isDefault: false },
    { name: 'PLA, few pulls', material: 'pla', shellMm: 5, topMm: 5, infillPercent: 50, isDefault: false },
  ],
};
