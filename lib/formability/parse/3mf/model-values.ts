import type { MeshUnit } from '../../recipe';
import { UnusableInput } from '../../unusable-input';
import { parseNumber } from '../decimal';
import type { Matrix } from './model';

const UNITS: Record<string, MeshUnit> = {
  micron: 'micron',
  millimeter: 'mm',
  centimeter: 'cm',
  inch: 'in',
  foot: 'ft',
  meter: 'm',
};

/** @throws UnusableInput not_a_mesh where 3MF knows no such unit */
export function readUnit(text: string | null, where: string): MeshUnit {
  if (text === null) return 'mm';
  const unit = Object.hasOwn(UNITS, text) ? UNITS[text] : undefined;
  if (unit) return unit;
  throw new UnusableInput('not_a_mesh', `${where} is in "${text.slice(0, 40)}"; a 3MF is in ${Object.keys(UNITS).join(', ')}: export it again`); // prettier-ignore
}

/** @throws UnusableInput not_a_mesh, non_finite */
export function readMatrix(text: string | null, owner: string): Matrix | null {
  if (text === null) return null;
  const words = text.trim().split(/[ \t\r\n]+/);
  const values = words.map(
    (word) => parseNumber(word) ?? refuse(owner, `"${word.slice(0, 40)}" in its transform`),
  );
  if (values.length !== 12) refuse(owner, `${values.length} numbers in its transform, not 12`);
  if (!values.every(Number.isFinite)) {
    throw new UnusableInput('non_finite', `${owner} has a transform that is not finite: ${text.slice(0, 120)}; export the 3MF again`); // prettier-ignore
  }
  if (!(Math.abs(determinant(values)) > 0)) {
    refuse(owner, `a transform that flattens the part (determinant 0): ${text.slice(0, 120)}`);
  }
  return values;
}

/** Below zero: the transform mirrors. */
export function determinant(m: Matrix): number {
  return (
    m[0] * (m[4] * m[8] - m[5] * m[7]) -
    m[1] * (m[3] * m[8] - m[5] * m[6]) +
    m[2] * (m[3] * m[7] - m[4] * m[6])
  );
}

/** First `inner`, then `outer`. */
export function multiply(inner: Matrix | null, outer: Matrix | null): Matrix | null {
  if (inner === null || outer === null) return inner ?? outer;
  const out: number[] = [];
  for (let row = 0; row < 4; row++) {
    for (let column = 0; column < 3; column++) {
      let sum = row === 3 ? outer[9 + column] : 0;
      for (let k = 0; k < 3; k++) sum += inner[3 * row + k] * outer[3 * k + column];
      out.push(sum);
    }
  }
  return out;
}

function refuse(owner: string, what: string): never {
  throw new UnusableInput('not_a_mesh', `${owner} has ${what}; export the 3MF again`);
}
