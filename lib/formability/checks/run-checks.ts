import { ownHoles, sureOfCheck } from '../judge-sureness';
import { CHECK_IDS, type Check, type CheckId } from '../report';
import { checkAir } from './check-air';
import { checkDraft } from './check-draft';
import { checkDraw } from './check-draw';
import { checkEdges } from './check-edges';
import { checkFit } from './check-fit';
import { checkHeat } from './check-heat';
import { checkLayers } from './check-layers';
import { checkMesh } from './check-mesh';
import { checkNozzle } from './check-nozzle';
import { checkOverhang } from './check-overhang';
import { checkPrint } from './check-print';
import { checkRelease } from './check-release';
import { checkShell } from './check-shell';
import { checkSheet } from './check-sheet';
import { checkSkin } from './check-skin';
import { checkSpacing } from './check-spacing';
import { checkUndercut } from './check-undercut';
import { checkVents } from './check-vents';
import { checkWalls } from './check-walls';
import type { CheckInput } from './check-input';
import { notRun } from './not-run';

const CHECKS: Record<CheckId, (input: CheckInput) => Check | null> = {
  mesh: checkMesh,
  fit: checkFit,
  draft: checkDraft,
  undercut: checkUndercut,
  layers: checkLayers,
  edges: checkEdges,
  spacing: checkSpacing,
  draw: checkDraw,
  sheet: checkSheet,
  air: checkAir,
  vents: checkVents,
  shell: checkShell,
  skin: checkSkin,
  walls: checkWalls,
  heat: checkHeat,
  nozzle: checkNozzle,
  overhang: checkOverhang,
  release: checkRelease,
  print: checkPrint,
};

/** Every check of the contract, in its order, each saying how sure it is. */
export function runChecks(input: CheckInput): Check[] {
  return CHECK_IDS.map((id) => {
    const check = CHECKS[id](input) ?? notRun(id, input.geometryOnly);
    if (!check) throw new Error(`check ${id} was not made and says no reason`);
    const sureness = sureOfCheck(id, check.basis, input.report.sureness, ownHoles(input.recipe));
    return { ...check, basis: { ...check.basis, sureness } };
  });
}
