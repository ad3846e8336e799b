import type { PresetDocument } from '@/engine/schema/preset';

import { sameDocument } from '../state/same-document';
import type { WorkbenchState } from '../state/store';

/** Why the document cannot be saved as a version now; null where it can. */
export function refuseSave(
  state: Pick<WorkbenchState, 'origin' | 'document' | 'saved'>,
  signedIn: boolean,
): string | null {
  const { origin } = state;
  if (origin.kind === 'shared')
    return origin.signedIn || signedIn
      ? 'A shared preset is not saved over; save it as a copy of your own.'
      : 'Sign in to save a copy of your own.';
  if (origin.kind === 'assigned')
    return 'Work on an assigned sweep is kept by itself; hand it in when it is done.';
  if (origin.kind === 'new') return null;
  if (!origin.rights.includes('save'))
    return origin.starter
      ? 'Starter presets stay as they are; save a copy of your own.'
      : 'You may look at this preset but not save it; save a copy of your own.';
  return isDirty(state) ? null : 'Nothing has changed since it was saved.';
}

/** Why no copy can be taken of what is on the bench; null where it can. */
export function refuseCopy({ origin }: Pick<WorkbenchState, 'origin'>): string | null {
  return origin.kind === 'shared' && !origin.mayCopy
    ? 'Whoever shared this preset allows looking, not copying.'
    : null;
}

/** Why there is nothing to share yet; null where there is. */
export function refuseShare(state: Pick<WorkbenchState, 'origin'>): string | null {
  const { origin } = state;
  if (origin.kind === 'new') return 'Save the preset first; then it can be shared.';
  if (origin.kind === 'shared') return 'This preset is shared already; pass on its address.';
  if (origin.kind === 'assigned') return 'An assigned sweep is handed in, not shared.';
  const may = origin.rights.includes('share by link') || origin.rights.includes('change visibility');
  return may ? null : 'Only those who may share this preset can make links to it.';
}

/** Answer for the pair asked about last: many views ask about the same one. */
let last: {
  readonly document: PresetDocument;
  readonly saved: PresetDocument;
  readonly dirty: boolean;
} | null = null;

/** Whether the document holds anything that is not saved; an edit and its reverse leave nothing. */
export function isDirty(state: Pick<WorkbenchState, 'document' | 'saved'>): boolean {
  const { document, saved } = state;
  if (document === saved) return false;
  if (!last || last.document !== document || last.saved !== saved)
    last = { document, saved, dirty: !sameDocument(document, saved) };
  return last.dirty;
}
