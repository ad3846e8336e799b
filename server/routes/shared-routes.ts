import { Router } from 'express';

import { duplicatePresetSchema, type SharedBody } from '@/contract/presets';

import { readDocument } from '../commands/assigned/known-facts';
import { countOpening, demandCopy, openLink } from '../commands/link-commands';
import { copyDocument } from '../commands/preset-commands';
import type { Dependencies } from '../dependencies';
import { requireSignedIn, signedIn, visitorOrPerson } from '../middleware/current-user';
import { parseBody } from '../middleware/parse';
import { presentPreset, presentVersion } from '../presenters/present-preset';

/** What links open, for anyone who has one. */
export function sharedRoutes(dependencies: Dependencies): Router {
  const router = Router();

  router.get('/shared/:token', async (request, response) => {
    const { link, preset, version } = await openLink(dependencies, String(request.params.token));
    await countOpening(dependencies, visitorOrPerson(request), { link, preset });
    const body: SharedBody = {
      title: preset.title,
      mayCopy: link.access === 'copy',
      owner: preset.owner?.name ?? '',
      version: presentVersion(version),
      document: await readDocument(dependencies, visitorOrPerson(request), preset, version),
    };
    response.json(body);
  });

  router.post('/shared/:token/copy', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    const opened = await openLink(dependencies, String(request.params.token));
    demandCopy(opened.link);
    // A link shows the head, whatever version is asked for.
    const { title } = parseBody(request, duplicatePresetSchema);
    const { preset, version } = await copyDocument(dependencies, person, opened, title);
    const document = await readDocument(dependencies, person, preset, version);
    response.status(201).json(presentPreset(person, preset, version, document));
  });

  return router;
}
