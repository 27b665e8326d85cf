import { and, eq } from 'drizzle-orm';
import { Router } from 'express';
import * as z from 'zod';
import type { Database } from '../../db/database.ts';
import { Problem } from '../../db/problem.ts';
import { files } from '../../db/schema/files.ts';
import { requireReadable } from '../../db/study-reads.ts';
import { parsePart, requireActor } from '../../http/mount.ts';

const paramsSchema = z.object({ studyId: z.uuid(), fileId: z.uuid() });

/** Uploaded originals, to those who may read the study; always as an attachment, never shown by the browser. */
export function fileRouter(db: Database): Router {
  const router = Router();
  router.get('/api/studies/:studyId/files/:fileId', async (request, response) => {
    const actor = await requireActor(request, db);
    const { studyId, fileId } = parsePart(paramsSchema, request.params, 'params');
    requireReadable(actor, studyId);
    const [file] = await db
      .select()
      .from(files)
      .where(and(eq(files.studyId, studyId), eq(files.id, fileId)));
    if (!file) throw new Problem('not found', 'There is no such file in this study.');
    response
      .attachment(file.name)
      .set({ 'Content-Type': 'application/octet-stream', 'Content-Security-Policy': "default-src 'none'; sandbox" })
      .send(file.content);
  });
  return router;
}
