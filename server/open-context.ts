import pino from 'pino';
import type { Logger } from 'pino';
import { movableClock, realClock } from './clock/clock';
import type { Settings } from './config/settings';
import type { Context } from './context';
import { connect } from './database/connection';
import { initModels } from './database/models';
import { openPrinter } from './printing/printer';

export interface OpenedContext extends Context {
  /** Ends the pool, the printing browser and the clock's own reading. */
  close(): Promise<void>;
}

/** How often a program reads by itself how far the clock was moved in rehearsal. */
const clockReadMs = 1_000;

export function makeLog(settings: Settings, program: string): Logger {
  return pino({
    level: settings.logLevel,
    base: { program },
    timestamp: pino.stdTimeFunctions.isoTime,
  });
}

/** Builds everything the programs need from their surroundings, once at start. */
export async function openContext(settings: Settings, program: string): Promise<OpenedContext> {
  const log = makeLog(settings, program);
  const db = connect(settings.databaseUrl);
  initModels(db);
  const clock = settings.rehearsal ? movableClock(db) : realClock();
  await clock.refresh();
  const reading = settings.rehearsal
    ? setInterval(() => {
        clock.refresh().catch((error: unknown) => log.warn({ err: error }, 'clock not read'));
      }, clockReadMs)
    : null;
  reading?.unref();
  const printer = openPrinter(settings.chromium);
  return {
    settings,
    db,
    clock,
    log,
    printer,
    close: async () => {
      if (reading) clearInterval(reading);
      await printer.close();
      await db.close();
    },
  };
}
