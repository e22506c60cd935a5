import path from 'node:path';
import type { Logger } from 'pino';
import type { AppDeps } from './app-deps.ts';
import type { AppConfig } from './config/config.ts';
import { createDataSource } from './entities/data-source.ts';
import { systemClock } from './http/clock.ts';
import { createRenderProcess } from './imaging/render-process.ts';
import { createCalculationSheetHandler } from './jobs/handlers/make-calculation-sheet.ts';
import { createRenditionHandler } from './jobs/handlers/make-rendition.ts';
import { createRemindReviewersHandler } from './jobs/handlers/remind-reviewers.ts';
import { createRenderDrawingHandler } from './jobs/handlers/render-drawing.ts';
import { createSendDigestHandler } from './jobs/handlers/send-digest.ts';
import { createSendMailHandler } from './jobs/handlers/send-mail.ts';
import type { JobHandlers } from './jobs/jobs-port.ts';
import { createPgBossJobs } from './jobs/pg-boss-jobs.ts';
import { createPgLive } from './live/pg-live.ts';
import type { MailerPort } from './mail/mailer-port.ts';
import { createOutboxFolderMailer } from './mail/outbox-folder-mailer.ts';
import { createSmtpMailer } from './mail/smtp-mailer.ts';
import { requeueCalculationSheets } from './services/calculation-sheet-service.ts';
import { requeueDigests } from './services/digest-queue.ts';
import { requeueWaitingMails } from './services/mail-delivery.ts';
import { requeueRenderJobs } from './services/render-job-service.ts';
import { requeueRenditions } from './services/rendition-job-service.ts';
import { requeueReminders } from './services/review-reminders.ts';
import { readingDeps } from './services/service-deps.ts';
import { createLocalDiskStorage } from './storage/local-disk-storage.ts';
import { sweepLeftovers } from './storage/sweep-leftovers.ts';

const APP_ROLE = 'tracehead_app';

export interface Product {
  deps: AppDeps;
  /** Starts the live channel and the background workers. */
  startWork(): Promise<void>;
  /** Lets jobs finish within `graceMs`, then closes everything. */
  stop(graceMs: number): Promise<void>;
}

/** Makes the concrete adapters and hands them on: the one place where ports meet what is behind them. */
export async function compose(config: AppConfig, logger: Logger): Promise<Product> {
  const login = loginOf(config);
  const db = await createDataSource(login).initialize();
  const jobs = createPgBossJobs({ ...login, logger });
  const live = createPgLive({ ...login, logger });
  const mailer = createMailer(config);
  const storage = createLocalDiskStorage(config.storageDir);
  const deps: AppDeps = { config, db, storage, jobs, live, clock: systemClock, logger };
  return {
    deps,
    async startWork() {
      await sweepLeftovers(config.storageDir, systemClock.now());
      await live.start();
      await jobs.start(jobHandlers(deps, mailer));
      // What waited or was under way when the last process ended is taken up again.
      await requeueRenderJobs(readingDeps(deps));
      await requeueWaitingMails(deps);
      await requeueCalculationSheets(readingDeps(deps));
      await requeueRenditions(readingDeps(deps));
      await requeueReminders(deps);
      await requeueDigests(deps);
    },
    async stop(graceMs) {
      await jobs.stop(graceMs);
      await live.stop();
      mailer.close();
      await db.destroy();
    },
  };
}

/** With one login for both purposes the application's role is taken on connecting. */
function loginOf(config: AppConfig): { url: string; role?: string } {
  if (config.databaseAppUrl) return { url: config.databaseAppUrl };
  return { url: config.databaseUrl ?? '', role: APP_ROLE };
}

function createMailer({ smtpUrl, mailFrom: from, storageDir }: AppConfig): MailerPort {
  if (smtpUrl) return createSmtpMailer({ smtpUrl, from });
  return createOutboxFolderMailer({ folder: path.join(storageDir, 'outbox'), from });
}

function jobHandlers(deps: AppDeps, mailer: MailerPort): JobHandlers {
  const { smtpUrl, production } = deps.config;
  return {
    'render-drawing': createRenderDrawingHandler(deps, () => createRenderProcess()),
    'make-calculation-sheet': createCalculationSheetHandler(deps),
    'make-rendition': createRenditionHandler(deps),
    'remind-reviewers': createRemindReviewersHandler(deps),
    'send-digest': createSendDigestHandler(deps),
    // Where mails are read on a page of ours their links have to stay.
    'send-mail': createSendMailHandler({ ...deps, mailer, forgetLinks: smtpUrl !== null || production }),
  };
}
