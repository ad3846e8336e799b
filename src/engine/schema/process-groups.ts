import type { PresetDocument } from './preset';

/** Removes every process that one use of a template wrote. */
export function removeGroup(document: PresetDocument, group: string): PresetDocument {
  return {
    ...document,
    processes: document.processes.filter((process) => process.template?.group !== group),
  };
}

/** An id for a new process that no other process has. */
export function freeProcessId(document: PresetDocument, wanted: string): string {
  const taken = new Set(document.processes.map((process) => process.id));
  const base = wanted.slice(0, 56) || 'process';
  if (!taken.has(base)) return base;
  let k = 2;
  while (taken.has(`${base}-${k}`)) k += 1;
  return `${base}-${k}`;
}
