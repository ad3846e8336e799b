/** Every command of the workbench, in the order of the palette. */
import { addParameter } from './add-parameter';
import { addPopulation } from './add-population';
import { cancelRun } from './cancel-run';
import { checkOtherMethod } from './check-other-method';
import type { Command } from './command';
import { comments } from './comments';
import { exportModel } from './export-model';
import { findEquilibria } from './find-equilibria';
import { fullPicture } from './full-picture';
import { importModel } from './import-model';
import { handIn } from './hand-in';
import { keepTraits } from './keep-traits';
import { openPalette } from './open-palette';
import { poolClasses } from './pool-classes';
import { redo } from './redo';
import { pictureTable } from './picture-table';
import { runSweep } from './run-sweep';
import { saveCopy } from './save-copy';
import { saveVersion } from './save-version';
import { share } from './share';
import { showExplore, showLongRun, showModel, showSweep, showTwoParameters } from './show-arrangement';
import { showShortcuts } from './show-shortcuts';
import { toggleFindings } from './toggle-findings';
import { toggleRail } from './toggle-rail';
import { toggleTwin } from './toggle-twin';
import { computeMap, traceBoundaries } from './two-parameters';
import { typeEquations } from './type-equations';
import { undo } from './undo';
import { versionHistory } from './version-history';

export const COMMANDS: readonly Command[] = [
  undo,
  redo,
  addPopulation,
  addParameter,
  typeEquations,
  saveVersion,
  saveCopy,
  handIn,
  share,
  versionHistory,
  comments,
  exportModel,
  importModel,
  runSweep,
  fullPicture,
  traceBoundaries,
  computeMap,
  pictureTable,
  findEquilibria,
  checkOtherMethod,
  cancelRun,
  poolClasses,
  keepTraits,
  toggleTwin,
  showExplore,
  showSweep,
  showTwoParameters,
  showLongRun,
  showModel,
  toggleRail,
  toggleFindings,
  openPalette,
  showShortcuts,
];
