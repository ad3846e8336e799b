import type { NewLink } from '@/contract/presets';

import type { Dependencies } from '../dependencies';
import { Refusal, refuseInvalid, refuseNotAllowed, refuseNotFound } from '../errors';
import { hashToken, makeId, makeToken } from '../ids';
import type { Person } from '../middleware/current-user';
import type { ShareLink } from '../models/share-link';
import { demand } from '../policies/preset-policy';
import { findPreset, findPresetAndHead, type FoundPreset } from './find-preset';
import { auditPreset, type PresetAndVersion } from './preset-commands';

export async function createLink(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  { label, expiresAt, access }: NewLink,
): Promise<{ link: ShareLink; token: string }> {
  const preset = await findPreset(dependencies, presetId);
  demand(person, 'share by link', preset);
  if (expiresAt !== null && Date.parse(expiresAt) <= Date.now())
    throw refuseInvalid({ expiresAt: 'This time has passed. Choose a later one.' });
  const token = makeToken();
  const { ShareLink } = dependencies.database.models;
  const link = await dependencies.database.change(async (transaction) => {
    await auditPreset(dependencies, transaction, person, 'link created', preset, { label });
    return ShareLink.create(
      {
        id: makeId(),
        presetId,
        tokenHash: hashToken(token),
        label,
        createdById: person.id,
        createdAt: new Date(),
        expiresAt: expiresAt === null ? null : new Date(expiresAt),
        access,
      },
      { transaction },
    );
  });
  return { link, token };
}

export async function revokeLink(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  linkId: string,
): Promise<void> {
  const preset = await findPreset(dependencies, presetId);
  demand(person, 'share by link', preset);
  const { ShareLink } = dependencies.database.models;
  const link = await ShareLink.findOne({ where: { id: linkId, presetId } });
  if (link === null) throw refuseNotFound('This preset has no such link.');
  if (link.revokedAt !== null) return;
  await dependencies.database.change(async (transaction) => {
    await ShareLink.update({ revokedAt: new Date() }, { where: { id: linkId }, transaction });
    await auditPreset(dependencies, transaction, person, 'link withdrawn', preset, { label: link.label });
  });
}

/** What a link opens: the head version, as long as the link has not ended and the preset is not gone. */
export async function openLink(
  dependencies: Dependencies,
  token: string,
): Promise<PresetAndVersion & { link: ShareLink }> {
  const gone = refuseNotFound(
    'This link opens nothing: it was withdrawn, has expired, or its address is incomplete.',
  );
  const link = await dependencies.database.models.ShareLink.findOne({
    where: { tokenHash: hashToken(token) },
  });
  const ended = link?.expiresAt && link.expiresAt.getTime() <= Date.now();
  if (link === null || link.revokedAt !== null || ended) throw gone;
  try {
    return { link, ...(await findPresetAndHead(dependencies, link.presetId)) };
  } catch (error) {
    throw error instanceof Refusal ? gone : error;
  }
}

export async function countOpening(
  dependencies: Dependencies,
  person: Person | null,
  { link, preset }: { link: ShareLink; preset: FoundPreset },
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    await database.models.ShareLink.increment('opened', { where: { id: link.id }, transaction });
    await database.models.ShareLink.update(
      { lastOpenedAt: new Date() },
      { where: { id: link.id }, transaction },
    );
    await auditPreset(dependencies, transaction, person, 'link opened', preset, { label: link.label });
  });
}

/** A link may be for looking alone. */
export function demandCopy({ access }: ShareLink): void {
  if (access === 'copy') return;
  throw refuseNotAllowed(
    'Whoever made this link allows looking, not copying. Ask them for a link with which a copy can be made.',
  );
}
