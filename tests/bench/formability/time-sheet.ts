import { formSheet } from '@/lib/formability/sheet/form-sheet';
import type { SheetInput } from '@/lib/formability/sheet/sheet-input';
import { block, field } from '../../unit/formability/sheet/templates';

export interface SheetTimes {
  nodes: [number, number];
  iterations: number;
  steps: number;
  bestMs: number;
  cpuMs: number;
  /** Nodes × iterations of the full mesh by the whole processor time, half mesh and measuring included, per second. */
  nodeIterationsPerS: number;
  peakMB: number;
  q05Mm: number;
  minMm: number;
  meshErrorPercent: number;
}

const ROUNDS = 3;

/** Shapes of the feasibility study in a 180 × 150 frame (square: 150 × 150), 1 mm sheet. */
const SHAPES: Record<string, () => SheetInput> = {
  frustum: () => shape(field([120, 90], block(120, 90, 50, 5)), [180, 150]),
  hill: () => {
    const hill = (x: number, y: number) => {
      const r = Math.hypot(x / 60, y / 45);
      return r < 1 ? 42 * Math.cos((r * Math.PI) / 2) ** 2 : 0;
    };
    return shape(field([120, 90], hill), [180, 150]);
  },
  towers: () => {
    const high = block(32, 34, 45, 5);
    const low = block(32, 34, 30, 5);
    return shape(
      field([90, 34], (x, y) => Math.max(high(x + 29, y), low(x - 29, y))),
      [180, 150],
    );
  },
  square: () => shape(field([90, 90], block(90, 90, 40, 5)), [150, 150]),
};

function shape(template: SheetInput['template'], frameMm: [number, number]): SheetInput {
  return { template, frameMm, gaugeMm: 1, minFormedMm: 0.35 };
}

function timeSheet(name: string, nodes: number, preview: boolean): SheetTimes {
  const input = SHAPES[name]();
  let bestMs = Infinity;
  let cpuMs = Infinity;
  let formed = formSheet(input, { nodes: 16 });
  for (let round = 0; round < ROUNDS; round++) {
    const cpu = process.cpuUsage();
    const began = performance.now();
    formed = formSheet(input, { nodes, preview });
    bestMs = Math.min(bestMs, performance.now() - began);
    const used = process.cpuUsage(cpu);
    cpuMs = Math.min(cpuMs, (used.user + used.system) / 1000);
  }
  const { report, iterations } = formed;
  return {
    nodes: report.nodes,
    iterations,
    steps: report.steps,
    bestMs,
    cpuMs,
    nodeIterationsPerS: (report.nodes[0] * report.nodes[1] * iterations) / (cpuMs / 1000),
    peakMB: process.resourceUsage().maxRSS / 1024,
    q05Mm: report.q05Mm,
    minMm: report.minMm,
    meshErrorPercent: report.meshErrorPercent,
  };
}

const [name, nodes, preview] = process.argv.slice(2);
process.stdout.write(JSON.stringify(timeSheet(name, Number(nodes), preview === 'true')));
