import { nearestSymbol } from '../expression/index';
import { listClasses } from '../schema/document-symbols';
import type { PresetDocument } from '../schema/preset';
import { SPREAD_KEY } from '../schema/symbols';
import { CAUTION, type Diagnostic } from './contract';
import { parameterKeysOf } from './model-graph';
import { figure, remark } from './remark';
import { spreadGroups } from './spread';

/** Start values, box sides, parameters and sweeps that contradict the rest of the document. */
export function checkReferences(document: PresetDocument): readonly Diagnostic[] {
  const found: Diagnostic[] = [];
  const classes = listClasses(document);
  for (const { population, class: entry, populationIndex, classIndex } of classes) {
    if (population.sign !== 'nonnegative' || entry.start >= 0) continue;
    const path = ['populations', populationIndex, 'classes', classIndex, 'start'];
    found.push(
      remark(
        'error',
        path,
        `The start value of ${entry.symbol} is ${figure(entry.start)}; a density may not be negative.`,
      ),
    );
  }
  document.box.forEach((side, k) => {
    if (!classes.some((entry) => entry.class.symbol === side.class)) {
      found.push(
        remark(
          'warning',
          ['box', k, 'class'],
          `The state box names ${side.class}, which is no class; remove this side.`,
        ),
      );
    } else if (side.from >= side.to) {
      found.push(remark('error', ['box', k, 'to'], `The box of ${side.class} must end above its beginning.`));
    }
  });
  const keys = new Set([...parameterKeysOf(document, spreadGroups(document)).keys, 'spread', SPREAD_KEY]);
  document.sweeps.forEach((sweep, k) => {
    if (!keys.has(sweep.parameter)) {
      const near = nearestSymbol(sweep.parameter, keys);
      const hint = near === null ? 'choose an existing one' : `${near} may be meant`;
      found.push(
        remark(
          'warning',
          ['sweeps', k, 'parameter'],
          `This sweep moves ${sweep.parameter}, which is no parameter; ${hint}.`,
          near,
        ),
      );
    } else if (sweep.from === sweep.to) {
      found.push(remark('warning', ['sweeps', k, 'to'], 'This sweep begins where it ends; give it a range.'));
    }
  });
  document.processes.forEach((process, k) => {
    const name = process.name || process.id;
    if (process.effects.length === 0) {
      found.push(
        remark('warning', ['processes', k, 'effects'], `${name} changes no class; say what one event does.`),
      );
    }
    if (process.signed) {
      found.push(
        remark(
          'note',
          ['processes', k, 'signed'],
          `${name} has a signed rate: the model is deterministic only, without events of chance.`,
        ),
      );
    }
  });
  const harvest = document.processes.findIndex((process) => process.kind === 'harvest');
  if (harvest >= 0) found.push(remark('note', ['processes', harvest], CAUTION));
  return found;
}
