import { readPreset } from '@/engine/schema/migrate';
import type { PresetDocument } from '@/engine/schema/preset';

const PREFIX = 'moiety.draft.';

/** Unsaved work as it was kept in this browser. */
export interface Draft {
  readonly document: PresetDocument;
  /** Version that the work began from; null for a preset not saved yet. */
  readonly baseVersion: number | null;
  readonly keptAt: string;
}

/** Keeps a draft; false where the browser has no room or does not allow it. */
export function keepDraft(key: string, draft: Draft): boolean {
  try {
    localStorage.setItem(PREFIX + key, JSON.stringify(draft));
    return true;
  } catch {
    return false;
  }
}

export function forgetDraft(key: string): void {
  try {
    localStorage.removeItem(PREFIX + key);
  } catch {
    // Without storage there is no draft either.
  }
}

/** The draft under a key; one that cannot be read any more counts as none. */
export function readDraft(key: string): Draft | null {
  try {
    const raw: unknown = JSON.parse(localStorage.getItem(PREFIX + key) ?? 'null');
    if (typeof raw !== 'object' || raw === null || !('document' in raw)) return null;
    const read = readPreset(raw.document);
    if (!read.ok) return null;
    const base = 'baseVersion' in raw && typeof raw.baseVersion === 'number' ? raw.baseVersion : null;
    const keptAt = 'keptAt' in raw && typeof raw.keptAt === 'string' ? raw.keptAt : '';
    return { document: read.document, baseVersion: base, keptAt };
  } catch {
    return null;
  }
}
