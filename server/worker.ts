import { sealRecords } from './access-record/seal';
import { alertJobs } from './alerts/alert-jobs';
import { alertInstead } from './alerts/pass-on-alerts';
import { callInstead } from './calls/call-instead';
import { closeNeedlessCalls } from './calls/needless-calls';
import { raiseUnansweredCalls } from './calls/unanswered-calls';
import { openMailChannel } from './channels/mail/mail-channel';
import { openSmsChannel } from './channels/sms/sms-channel';
import { readSettings, SettingsError } from './config/settings';
import type { Context } from './context';
import { pruneChanges } from './database/prune';
import { checkFitness, NotFit } from './main';
import { followUnreadLetters } from './messages/unread-letters';
import { openContext } from './open-context';
import { outboxHealth } from './outbox/health';
import { createSender } from './outbox/sender';
import { runSender, type PeriodicJob } from './outbox/sender-loop';
import { raiseNotSaidBackCalls } from './say-it-back/say-back-calls';

function jobsOf(context: Context): PeriodicJob[] {
  const { db, clock, log, settings } = context;
  let wasStuck = false;
  return [
    {
      name: 'unanswered families',
      everyMs: settings.sender.callListEveryMs,
      run: () => raiseUnansweredCalls(context),
    },
    { name: 'plans not said back', everyMs: 60_000, run: () => raiseNotSaidBackCalls(context) },
    { name: 'needless calls', everyMs: 10_000, run: () => closeNeedlessCalls(context) },
    ...alertJobs(context),
    { name: 'unread letters', everyMs: 60_000, run: () => followUnreadLetters(context) },
    {
      name: 'sealing',
      everyMs: 10_000,
      run: async () => {
        const seal = await sealRecords(db, clock.now());
        // The log is kept elsewhere than the database: whoever rewrites the chain cannot rewrite it there.
        if (seal) log.info({ seal }, 'Access record sealed');
      },
    },
    { name: 'pruning', everyMs: 60_000, run: () => pruneChanges(db, Date.now()) },
    {
      name: 'health',
      everyMs: 60_000,
      run: async () => {
        const health = await outboxHealth(db, clock.now());
        // Twice in a row: a clock that was moved in rehearsal makes everything overdue for a moment.
        if (health.isStuck && wasStuck) log.error({ health }, 'Messages are due and do not go out');
        else log.info({ health }, 'Outbox');
        wasStuck = health.isStuck;
      },
    },
  ];
}

/** The sender: everything that leaves the clinic, and what has to happen without anybody asking. */
async function main(): Promise<void> {
  const settings = readSettings(process.env);
  const context = await openContext(settings, 'sender');
  await checkFitness(context).catch(async (error: unknown) => {
    await context.close();
    throw error;
  });
  const mail = openMailChannel(settings);
  const call = callInstead(context);
  const loop = runSender({
    sender: createSender({
      db: context.db,
      clock: context.clock,
      log: context.log,
      sms: openSmsChannel(settings),
      mail,
      giveUp: (transaction, message) =>
        message.kind === 'alert'
          ? alertInstead(context, transaction, message)
          : call(transaction, message),
      claimLastsMs: settings.sender.claimLastsMs,
      perSecond: settings.sender.perSecond,
    }),
    idleMs: settings.sender.looksEveryMs,
    log: context.log,
    refresh: () => context.clock.refresh(),
    jobs: jobsOf(context),
  });
  let closing: Promise<void> | undefined;
  const close = () =>
    (closing ??= (async () => {
      await loop.stop();
      mail.close();
      await context.close();
      if (process.connected) process.disconnect();
    })());
  process.on('SIGTERM', () => void close());
  process.on('disconnect', () => void close());
  process.send?.({ ready: true });
}

main().catch((error: unknown) => {
  const isPlain = error instanceof NotFit || error instanceof SettingsError;
  const says = error instanceof Error ? (isPlain ? error.message : error.stack) : String(error);
  process.stderr.write(`${says}\n`);
  process.exit(isPlain ? 2 : 1);
});
