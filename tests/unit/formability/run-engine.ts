import { analyse } from '@/lib/formability/analyse';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { Check, CheckId, Report } from '@/lib/formability/report';
import { UnusableInput } from '@/lib/formability/unusable-input';
import type { Triangles } from '../../fixtures/meshes/triangles';
import { binaryStl } from '../../fixtures/meshes/write-stl';

/** The report on a mesh written as binary STL. */
export function reportOn(mesh: Triangles, recipe: RecipeInput = {}): Report {
  return analyse(binaryStl(mesh), recipe).report;
}

export function checkOf(report: Report, id: CheckId): Check {
  const check = report.checks.find((one) => one.id === id);
  if (!check) throw new Error(`no check ${id}`);
  return check;
}

/** What the engine says about input it cannot use. */
export function refusal(work: () => unknown): { code: string; message: string } {
  try {
    work();
  } catch (error) {
    if (error instanceof UnusableInput) return { code: error.code, message: error.message };
    throw error;
  }
  throw new Error('the input was taken');
}

/** Area of a regular polygon whose corners lie on a circle. */
export function polygonArea(radius: number, sides: number): number {
  return (sides / 2) * radius * radius * Math.sin((2 * Math.PI) / sides);
}

export function polygonPerimeter(radius: number, sides: number): number {
  return 2 * sides * radius * Math.sin(Math.PI / sides);
}
