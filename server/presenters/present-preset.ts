import { HUES } from '@/engine/schema/preset';
import type {
  PresetBody,
  PresetSummary,
  ShareLink as ShareLinkBody,
  VersionSummary,
} from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';

import type { FoundPreset, FoundVersion } from '../commands/find-preset';
import type { Person } from '../middleware/current-user';
import type { ShareLink } from '../models/share-link';
import { rightsOn } from '../policies/preset-policy';

const PRODUCT = 'Moiety';

export function presentSummary(preset: FoundPreset): PresetSummary {
  return {
    id: preset.id,
    title: preset.title,
    summary: preset.summary,
    tags: preset.tagLines.split('\n').filter(Boolean),
    starter: preset.visibility === 'starter',
    visibility: preset.visibility,
    owner: preset.owner,
    lab: preset.lab,
    version: preset.headNumber,
    changedAt: preset.changedAt.toISOString(),
    createdAt: preset.createdAt.toISOString(),
    populations: preset.populations,
  };
}

export function presentVersion(version: Omit<FoundVersion, 'document'>): VersionSummary {
  return {
    number: version.number,
    author: version.author?.name ?? PRODUCT,
    savedAt: version.savedAt.toISOString(),
    note: version.note,
    restoredFrom: version.restoredFrom,
  };
}

/** `document` is that of the version as this person may read it. */
export function presentPreset(
  person: Person,
  preset: FoundPreset,
  version: FoundVersion,
  document: PresetDocument,
): PresetBody {
  return {
    preset: presentSummary(preset),
    version: presentVersion(version),
    document,
    rights: rightsOn(person, preset),
  };
}

export function presentLink(link: ShareLink): ShareLinkBody {
  return {
    id: link.id,
    label: link.label,
    createdAt: link.createdAt.toISOString(),
    revokedAt: link.revokedAt?.toISOString() ?? null,
    opened: link.opened,
    lastOpenedAt: link.lastOpenedAt?.toISOString() ?? null,
    expiresAt: link.expiresAt?.toISOString() ?? null,
    access: link.access,
  };
}

/** What the library's card shows of the populations of a document. */
export function populationsOf(document: PresetDocument): PresetSummary['populations'] {
  return document.populations.map(({ name, symbol, hue, classes }) => ({
    name: name || symbol,
    hue: HUES.includes(hue) ? hue : 'slate',
    classes: classes.length,
  }));
}
