import { sealRecords } from './access-record/seal';
import { raiseCall } from './calls/calls';
import { raiseUnansweredCalls } from './calls/unanswered-calls';
import { openMailChannel } from './channels/mail/mail-channel';
import { openSmsChannel } from './channels/sms/sms-channel';
import { readSettings, SettingsError } from './config/settings';
import type { Context } from './context';
import { pruneChanges } from './database/prune';
import { checkFitness, NotFit } from './main';
import { openContext } from './open-context';
import type { GiveUp } from './outbox/give-up';
import { outboxHealth } from './outbox/health';
import { createSender } from './outbox/sender';
import { runSender, type PeriodicJob } from './outbox/sender-loop';

/** A message that reached nobody becomes a call, in the transaction that gives it up. */
const callInstead =
  ({ db, clock }: Context): GiveUp =>
  async (transaction, message) => {
    const now = clock.now();
    const whom = message.familyMemberId ?? `message-${message.id}`;
    await raiseCall(db, transaction, {
      reason: message.callReason,
      openKey: `${message.callReason}:${whom}:${message.morningOn ?? ''}`,
      householdId: message.householdId,
      familyMemberId: message.familyMemberId,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  };

function jobsOf(context: Context): PeriodicJob[] {
  const { db, clock, log } = context;
  let wasStuck = false;
  return [
    { name: 'unanswered families', everyMs: 5_000, run: () => raiseUnansweredCalls(context) },
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
  const loop = runSender({
    sender: createSender({
      db: context.db,
      clock: context.clock,
      log: context.log,
      sms: openSmsChannel(settings),
      mail,
      giveUp: callInstead(context),
    }),
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
