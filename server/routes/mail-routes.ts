import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { getMail, listMails } from '#server/services/mail-queries.ts';
import { sendAgain } from '#server/services/mail-service.ts';
import { inTransaction, readingDeps } from '#server/services/service-deps.ts';
import { id, pageQuery } from '#shared/contract/common.ts';
import { mailDetailDto, mailListDto } from '#shared/contract/mails.ts';

const mailParams = z.object({ mailId: id });

/** Mails that were written: everyone's own, all of them for administrators. */
export const mailRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/mails',
    access: { who: 'signedIn' },
    query: pageQuery,
    reply: mailListDto,
    handle: ({ deps, actor, query }) => listMails(deps.db.manager, actor, query.cursor),
  }),
  defineRoute({
    method: 'get',
    path: '/mails/:mailId',
    access: { who: 'signedIn' },
    params: mailParams,
    reply: mailDetailDto,
    handle: ({ deps, actor, params }) => getMail(readingDeps(deps), actor, params.mailId),
  }),
  defineRoute({
    method: 'post',
    path: '/mails/:mailId/send-again',
    access: { who: 'global', action: 'mail.read' },
    params: mailParams,
    handle: ({ deps, params }) => inTransaction(deps, (tx) => sendAgain(tx, params.mailId)),
  }),
];
