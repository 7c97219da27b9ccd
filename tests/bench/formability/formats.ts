import { strFromU8, unzipSync } from 'fflate';
import { SaxesParser } from 'saxes';
import { loadMesh } from '@/lib/formability/parse/load-mesh';
import { plain3mf, START } from '../../fixtures/meshes/write-3mf';
import { cylindersStep } from '../../fixtures/meshes/write-step';
import { asciiStl, binaryStl } from '../../fixtures/meshes/write-stl';
import { benchMesh } from './bench-mesh';

const ROUNDS = 3;

/** Least processor time of some rounds, in milliseconds: the machine may do other things as well. */
async function least(work: () => unknown): Promise<number> {
  let best = Infinity;
  for (let round = 0; round < ROUNDS; round++) {
    const before = process.cpuUsage();
    await work();
    const { user, system } = process.cpuUsage(before);
    best = Math.min(best, (user + system) / 1000);
  }
  return best;
}

async function elapsed(work: () => Promise<unknown>): Promise<number> {
  let best = Infinity;
  for (let round = 0; round < ROUNDS; round++) {
    const began = performance.now();
    await work();
    best = Math.min(best, performance.now() - began);
  }
  return best;
}

/** Reading alone, the same facets in each format; beside the 3MF, a general XML parser over its unpacked text. */
export async function run(size = 500_000): Promise<void> {
  const mesh = benchMesh(size);
  const as3mf = plain3mf(mesh);
  const xml = strFromU8(unzipSync(as3mf)[START]);
  const rows: [string, number, number][] = [];
  for (const [name, bytes] of [
    ['binary STL', binaryStl(mesh)],
    ['ASCII STL', asciiStl(mesh)],
    ['3MF', as3mf],
  ] as const) {
    rows.push([name, bytes.length, await least(() => loadMesh(bytes))]);
  }
  const saxes = await least(() => {
    let tags = 0;
    const parser = new SaxesParser({ xmlns: true });
    parser.on('opentag', () => tags++);
    for (let at = 0; at < xml.length; at += 65_536) parser.write(xml.slice(at, at + 65_536));
    parser.close();
    return tags;
  });
  const step = cylindersStep(Array.from({ length: 60 }, (_, k) => [9 * (k % 10), 9 * Math.floor(k / 10), 4, 10] as const)); // prettier-ignore
  const { triangles } = await loadMesh(step);
  console.log(`\nReading ${mesh.length / 9} facets, processor time`);
  for (const [name, bytes, ms] of rows) {
    console.log(
      `${name.padEnd(34)}${(bytes / 1e6).toFixed(1).padStart(10)} MB${ms.toFixed(0).padStart(10)} ms`,
    );
  }
  const own = rows[2][2];
  console.log(`${'saxes over the XML of that 3MF'.padEnd(34)}${(xml.length / 1e6).toFixed(1).padStart(10)} MB${saxes.toFixed(0).padStart(10)} ms  ${(saxes / own).toFixed(1)} × the whole 3MF`); // prettier-ignore
  console.log(`${`STEP of 60 cylinders, ${triangles} facets`.padEnd(34)}${(step.length / 1e6).toFixed(1).padStart(10)} MB${(await elapsed(() => loadMesh(step))).toFixed(0).padStart(10)} ms by the clock, process and all`); // prettier-ignore
}
