import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';

import { Router, type Response } from 'express';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { labEntries } from '../export/lab-export';
import { ownEntries } from '../export/own-export';
import { fileName, zipOf, type ArchiveEntry } from '../export/zip-stream';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { demandInLab } from '../policies/lab-policy';

async function sendArchive(
  response: Response,
  name: string,
  entries: AsyncIterable<ArchiveEntry>,
): Promise<void> {
  response.attachment(`${name}.zip`).type('application/zip');
  await pipeline(Readable.from(zipOf(entries)), response);
}

/** GET /account/export.zip and /labs/:labId/export.zip: everything that one person or one lab owns. */
export function exportRoutes(dependencies: Dependencies): Router {
  const { database } = dependencies;
  const router = Router();

  router.get('/account/export.zip', requireSignedIn, async (request, response) => {
    await sendArchive(response, 'moiety-account', ownEntries(dependencies, signedIn(request)));
  });

  router.get('/labs/:labId/export.zip', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    const labId = String(request.params.labId);
    demandInLab(person, 'export the lab', labId);
    const name = person.memberships.find((one) => one.labId === labId)?.labName ?? '';
    await database.change((transaction) =>
      recordAudit(database, transaction, {
        actor: person,
        action: 'lab exported',
        labId,
        subject: name,
        details: {},
      }),
    );
    await sendArchive(response, `moiety-${fileName(name)}`, labEntries(dependencies, person, labId));
  });

  return router;
}
