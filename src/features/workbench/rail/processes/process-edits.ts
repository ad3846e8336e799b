import { freeProcessId } from '@/engine/schema/edit';
import type { PresetDocument, Process } from '@/engine/schema/preset';

import { moveBy, removeAt, replaceAt } from '../replace-at';

export function changeProcess(
  document: PresetDocument,
  index: number,
  patch: Partial<Omit<Process, 'id'>>,
): PresetDocument {
  return { ...document, processes: replaceAt(document.processes, index, (one) => ({ ...one, ...patch })) };
}

export function removeProcess(document: PresetDocument, index: number): PresetDocument {
  return { ...document, processes: removeAt(document.processes, index) };
}

/** A copy beneath the original, no longer tied to a template. */
export function duplicateProcess(document: PresetDocument, index: number): PresetDocument {
  const original = document.processes[index];
  if (!original) return document;
  const copy: Process = {
    ...original,
    id: freeProcessId(document, original.id),
    name: original.name ? `${original.name}, copy`.slice(0, 120) : '',
    template: null,
  };
  const processes = [...document.processes];
  processes.splice(index + 1, 0, copy);
  return { ...document, processes };
}

export function moveProcess(document: PresetDocument, index: number, by: number): PresetDocument {
  return { ...document, processes: moveBy(document.processes, index, by) };
}

/** A process of one's own on some class, without a rate yet. */
export function addFreeProcess(document: PresetDocument, classSymbol: string): PresetDocument {
  const process: Process = {
    id: freeProcessId(document, 'process'),
    name: 'New process',
    kind: 'other',
    rate: '0',
    effects: [{ class: classSymbol, amount: '1' }],
    signed: false,
    template: null,
  };
  return { ...document, processes: [...document.processes, process] };
}

/** The whole derivative of a class as one signed process. */
export function addFreeEquation(document: PresetDocument, classSymbol: string): PresetDocument {
  const process: Process = {
    id: freeProcessId(document, `equation-${classSymbol}`),
    name: `Equation of ${classSymbol}`,
    kind: 'equation',
    rate: '0',
    effects: [{ class: classSymbol, amount: '1' }],
    signed: true,
    template: null,
  };
  return { ...document, processes: [...document.processes, process] };
}

/** A run of processes that one use of a template wrote, or a single one written by hand. */
export interface ProcessGroup {
  readonly group: string | null;
  readonly template: Process['template'];
  readonly indices: readonly number[];
}

/** Processes in order; those of one template that stand together are one group. */
export function groupProcesses(processes: readonly Process[]): readonly ProcessGroup[] {
  const groups: { group: string | null; template: Process['template']; indices: number[] }[] = [];
  processes.forEach((process, index) => {
    const group = process.template?.group ?? null;
    const last = groups.at(-1);
    if (last && group !== null && last.group === group) last.indices.push(index);
    else groups.push({ group, template: process.template, indices: [index] });
  });
  return groups;
}
