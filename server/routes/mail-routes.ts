import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { digestStopPage, personOfStopToken } from '#server/services/digest-link.ts';
import { chooseMailTiming, mailChoiceOf, stopDigests } from '#server/services/mail-choice-service.ts';
import { getMail, listMails } from '#server/services/mail-queries.ts';
import { sendAgain } from '#server/services/mail-service.ts';
import { mailTemplates } from '#server/services/mail-templates.ts';
import { inTransaction, readingDeps } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import {
  digestStopQuery,
  mailChoiceDto,
  mailChoiceInput,
  mailDetailDto,
  mailListDto,
  mailListQuery,
  mailTemplateListDto,
} from '#shared/contract/mails.ts';

const mailParams = z.object({ mailId: id });

/** Mails that were written: everyone's own, all of them for administrators. */
const writtenRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/mails',
    access: { who: 'signedIn' },
    query: mailListQuery,
    reply: mailListDto,
    handle: ({ deps, actor, query }) => listMails(deps.db.manager, actor, query),
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
  defineRoute({
    method: 'get',
    path: '/mail-templates',
    access: { who: 'global', action: 'mail.read' },
    reply: mailTemplateListDto,
    handle: async ({ deps }) => ({ items: mailTemplates(deps.config) }),
  }),
];

/** How notices come to the caller, and what a digest's link does without a sign-in. */
const choiceRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/me/mail-choice',
    access: { who: 'signedIn' },
    reply: mailChoiceDto,
    handle: ({ deps, actor }) => mailChoiceOf(deps.db.manager, actor.id),
  }),
  defineRoute({
    method: 'put',
    path: '/me/mail-choice',
    access: { who: 'signedIn' },
    body: mailChoiceInput,
    reply: mailChoiceDto,
    handle: ({ deps, actor, body }) => inTransaction(deps, (tx) => chooseMailTiming(tx, actor.id, body)),
  }),
  defineRoute({
    method: 'get',
    path: '/digest-stops',
    access: { who: 'public' },
    query: digestStopQuery,
    handle: async ({ deps, query, res }) => res.redirect(303, digestStopPage(deps.config, query.token)),
  }),
  defineRoute({
    method: 'post',
    path: '/digest-stops',
    access: { who: 'signedLink' },
    query: digestStopQuery,
    handle: ({ deps, query }) =>
      inTransaction(deps, (tx) => stopDigests(tx, personOfStopToken(deps.config, query.token))),
  }),
];

export const mailRoutes: RouteRecord[] = [...writtenRoutes, ...choiceRoutes];
