import * as z from 'zod/mini';
import { withReceivedArchive } from '#server/http/receive-archive.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { prepareArchive } from '#server/services/archive-service.ts';
import { restoreArchive } from '#server/services/restore-service.ts';
import { restoredDto } from '#shared/contract/archives.ts';
import { id } from '#shared/contract/common.ts';

export const archiveRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams/:damId/archive.zip',
    // A copy of everything is for those who may put the dam away.
    access: { who: 'dam', action: 'dam.archive', target: 'dam' },
    params: z.object({ damId: id }),
    handle: async ({ deps, params, actor, res }) => {
      const archive = await prepareArchive(deps, params.damId, actor);
      res.setHeader('Cache-Control', 'no-store');
      res.attachment(archive.fileName).type('application/zip');
      await archive.writeTo(res).catch((error: NodeJS.ErrnoException) => {
        // The reader went away.
        if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error;
      });
    },
  }),
  defineRoute({
    method: 'post',
    path: '/archives',
    access: { who: 'global', action: 'dam.create' },
    reply: restoredDto,
    status: 201,
    handle: ({ deps, actor, req }) =>
      withReceivedArchive(deps, req, (file) => restoreArchive(deps, file, actor.id)),
  }),
];
