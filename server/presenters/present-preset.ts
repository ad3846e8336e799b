import { HUES } from '@/engine/schema/preset';
import type {
  PresetBody,
  PresetSummary,
  ShareLink as ShareLinkBody,
  VersionSummary,
} from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';

import type { Person } from '../middleware/current-user';
import type { Preset } from '../models/preset';
import type { PresetVersion } from '../models/preset-version';
import type { ShareLink } from '../models/share-link';
import { rightsOn } from '../policies/preset-policy';

const PRODUCT = 'Moiety';

export function presentSummary(preset: Preset): PresetSummary {
  return {
    id: preset.id,
    title: preset.title,
    summary: preset.summary,
    tags: preset.tagLines.split('\n').filter(Boolean),
    starter: preset.visibility === 'starter',
    visibility: preset.visibility,
    owner: preset.owner ? { id: preset.owner.id, name: preset.owner.name } : null,
    lab: preset.lab ? { id: preset.lab.id, name: preset.lab.name } : null,
    version: preset.headNumber,
    changedAt: preset.changedAt.toISOString(),
    createdAt: preset.createdAt.toISOString(),
    populations: preset.populations,
  };
}

export function presentVersion(version: PresetVersion): VersionSummary {
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
  preset: Preset,
  version: PresetVersion,
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
