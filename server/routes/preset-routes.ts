import { Router, type Request } from 'express';
import { z } from 'zod';

import {
  changePresetSchema,
  createLinkSchema,
  createPresetSchema,
  duplicatePresetSchema,
  PAGE_SIZE,
  presetQuerySchema,
  restoreVersionSchema,
  saveVersionSchema,
} from '@/contract/presets';

import { readDocument } from '../commands/assigned/known-facts';
import { bringBack, listDeleted } from '../commands/deleted-presets';
import { findPreset, findPresetAndHead, findVersion, listVersions } from '../commands/find-preset';
import { createLink, revokeLink } from '../commands/link-commands';
import { listChoices, listPresets } from '../commands/list-presets';
import {
  changeVisibility,
  copyDocument,
  createPreset,
  deletePreset,
  restoreVersion,
  saveVersion,
  type PresetAndVersion,
} from '../commands/preset-commands';
import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseBody, parseQuery } from '../middleware/parse';
import { demand } from '../policies/preset-policy';
import { presentLink, presentPreset, presentVersion } from '../presenters/present-preset';

const pageSchema = z.object({ page: z.coerce.number().int().min(1).max(100_000).default(1) });

function versionNumber(request: Request): number {
  const text = String(request.params.number);
  if (!/^[1-9]\d{0,8}$/.test(text)) throw refuseNotFound('This preset has no version of that number.');
  return Number(text);
}

const presetId = (request: Request) => String(request.params.id);

export function presetRoutes(dependencies: Dependencies): Router {
  const { database, settings } = dependencies;
  const router = Router();
  router.use('/presets', requireSignedIn);
  const present = async (request: Request, { preset, version }: PresetAndVersion) => {
    const person = signedIn(request);
    return presentPreset(person, preset, version, await readDocument(dependencies, person, preset, version));
  };

  router.get('/presets', async (request, response) => {
    response.json(await listPresets(dependencies, signedIn(request), parseQuery(request, presetQuerySchema)));
  });

  router.post('/presets', async (request, response) => {
    const made = await createPreset(dependencies, signedIn(request), parseBody(request, createPresetSchema));
    response.status(201).json(await present(request, made));
  });

  router.get('/presets/choices', async (request, response) => {
    response.json(await listChoices(dependencies, signedIn(request)));
  });

  router.get('/presets/deleted', async (request, response) => {
    response.json(await listDeleted(dependencies, signedIn(request)));
  });

  router.post('/presets/:id/bring-back', async (request, response) => {
    await bringBack(dependencies, signedIn(request), presetId(request));
    response.status(204).end();
  });

  router.get('/presets/:id', async (request, response) => {
    const found = await findPresetAndHead(dependencies, presetId(request));
    demand(signedIn(request), 'view', found.preset);
    response.json(await present(request, found));
  });

  router.patch('/presets/:id', async (request, response) => {
    demand(signedIn(request), 'change visibility', await findPreset(dependencies, presetId(request)));
    const body = parseBody(request, changePresetSchema);
    response.json(
      await present(
        request,
        await changeVisibility(dependencies, signedIn(request), presetId(request), body),
      ),
    );
  });

  router.delete('/presets/:id', async (request, response) => {
    await deletePreset(dependencies, signedIn(request), presetId(request));
    response.status(204).end();
  });

  router.post('/presets/:id/duplicate', async (request, response) => {
    const preset = await findPreset(dependencies, presetId(request));
    demand(signedIn(request), 'duplicate', preset);
    const { version, title } = parseBody(request, duplicatePresetSchema);
    const source = await findVersion(dependencies, preset.id, version ?? preset.headNumber);
    response
      .status(201)
      .json(
        await present(
          request,
          await copyDocument(dependencies, signedIn(request), { preset, version: source }, title),
        ),
      );
  });

  router.get('/presets/:id/versions', async (request, response) => {
    const preset = await findPreset(dependencies, presetId(request));
    demand(signedIn(request), 'view', preset);
    const { page } = parseQuery(request, pageSchema);
    const pageSize = PAGE_SIZE.default;
    const { versions, total } = await listVersions(dependencies, preset.id, {
      limit: pageSize,
      offset: (page - 1) * pageSize,
    });
    response.json({ items: versions.map(presentVersion), total, page, pageSize });
  });

  router.post('/presets/:id/versions', async (request, response) => {
    demand(signedIn(request), 'save', await findPreset(dependencies, presetId(request)));
    const body = parseBody(request, saveVersionSchema);
    const saved = await saveVersion(dependencies, signedIn(request), presetId(request), body);
    response.status(201).json(await present(request, saved));
  });

  router.get('/presets/:id/versions/:number', async (request, response) => {
    const preset = await findPreset(dependencies, presetId(request));
    demand(signedIn(request), 'view', preset);
    const version = await findVersion(dependencies, preset.id, versionNumber(request));
    response.json(await present(request, { preset, version }));
  });

  router.post('/presets/:id/versions/:number/restore', async (request, response) => {
    demand(signedIn(request), 'restore', await findPreset(dependencies, presetId(request)));
    const body = parseBody(request, restoreVersionSchema);
    const number = versionNumber(request);
    const restored = await restoreVersion(dependencies, signedIn(request), presetId(request), number, body);
    response.status(201).json(await present(request, restored));
  });

  router.get('/presets/:id/links', async (request, response) => {
    const preset = await findPreset(dependencies, presetId(request));
    demand(signedIn(request), 'share by link', preset);
    const links = await database.models.ShareLink.findAll({
      where: { presetId: preset.id },
      order: [['createdAt', 'DESC']],
      limit: 200,
    });
    response.json({ links: links.map(presentLink) });
  });

  router.post('/presets/:id/links', async (request, response) => {
    demand(signedIn(request), 'share by link', await findPreset(dependencies, presetId(request)));
    const body = parseBody(request, createLinkSchema);
    const { link, token } = await createLink(dependencies, signedIn(request), presetId(request), body);
    response.status(201).json({ link: presentLink(link), token, url: `${settings.publicUrl}/s/${token}` });
  });

  router.delete('/presets/:id/links/:linkId', async (request, response) => {
    await revokeLink(dependencies, signedIn(request), presetId(request), String(request.params.linkId));
    response.status(204).end();
  });

  return router;
}
