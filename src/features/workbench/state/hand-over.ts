/** A bench on its way to another address: the first save moves the page, and history goes along. */
import type { WorkbenchStore } from './store';

let handed: { readonly id: string; readonly store: WorkbenchStore } | null = null;

/** Leaves a bench to the page of the preset that it was just saved as. */
export function handOver(presetId: string, store: WorkbenchStore): void {
  handed = { id: presetId, store };
}

/** The bench left for a preset, until it is settled. */
export function handedOver(presetId: string): WorkbenchStore | null {
  return handed?.id === presetId ? handed.store : null;
}

/** The page has its bench: a later visit opens what is saved. */
export function settleHandOver(): void {
  handed = null;
}
