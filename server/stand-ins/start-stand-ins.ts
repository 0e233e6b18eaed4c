import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { controlOf } from './control';
import { Faults } from './faults';
import { mailService } from './mail-service';
import { StandInStore } from './store';
import { textReports } from './text-reports';
import { textService } from './text-service';
import type { TextAccount } from './text-wire';

export interface StandInOptions {
  readonly account: TextAccount;
  /** Public address of the clinic, where reports and replies go. */
  readonly origin: () => string;
  /** 0 takes any free port; null leaves the service out. */
  readonly ports: {
    readonly sms: number | null;
    readonly mail: number | null;
    readonly control: number;
  };
  /** Business clock, read anew for each message. */
  readonly now: () => Promise<number>;
  /** Where texts and mails are kept over a restart; null keeps them in memory alone. */
  readonly file: string | null;
  readonly reportPauseMs?: number;
}

export interface StandIns {
  readonly store: StandInStore;
  readonly faults: Faults;
  readonly smsUrl: string;
  readonly mailUrl: string;
  readonly controlUrl: string;
  receiveFromPhone(phone: string, body: string): Promise<boolean>;
  close(): Promise<void>;
}

const loopback = '127.0.0.1';

interface Listening {
  readonly port: number;
  close(): Promise<void>;
}

async function listening(server: Server, port: number): Promise<Listening> {
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, loopback, resolve);
  });
  return {
    port: (server.address() as AddressInfo).port,
    close: async () => {
      const closed = new Promise((resolve) => server.close(resolve));
      server.closeAllConnections();
      await closed;
    },
  };
}

/** Starts the pretended text and mail services with their real wire formats, on loopback alone. */
export async function startStandIns(options: StandInOptions): Promise<StandIns> {
  const { account, ports, now } = options;
  const store = new StandInStore(options.file);
  const faults = new Faults();
  const reports = textReports({
    account,
    store,
    now,
    origin: options.origin,
    pauseMs: options.reportPauseMs ?? 300,
  });
  const running: { close(): Promise<void> }[] = [];
  let smsPort = 0;
  let mailPort = 0;
  try {
    if (ports.sms !== null) {
      const app = textService({
        account,
        store,
        faults,
        now,
        report: (id, fault) => reports.report(id, fault),
      });
      const sms = await listening(createServer(app), ports.sms);
      running.push(sms);
      smsPort = sms.port;
    }
    if (ports.mail !== null) {
      const smtp = mailService({ store, faults, now });
      // A client that goes away in the middle is an event here, not a fault.
      smtp.on('error', () => undefined);
      mailPort = await new Promise<number>((resolve, reject) => {
        smtp.server.once('error', reject);
        smtp.listen(ports.mail ?? 0, loopback, () =>
          resolve((smtp.server.address() as AddressInfo).port),
        );
      });
      running.push({
        close: () => new Promise((resolve) => void smtp.close(() => resolve())),
      });
    }
    const receiveFromPhone = (phone: string, body: string) => reports.receiveFromPhone(phone, body);
    const control = await listening(
      createServer(controlOf({ store, faults, receiveFromPhone })),
      ports.control,
    );
    running.push(control);
    reports.resume();
    return {
      store,
      faults,
      smsUrl: `http://${loopback}:${smsPort}`,
      mailUrl: `smtp://${loopback}:${mailPort}`,
      controlUrl: `http://${loopback}:${control.port}`,
      receiveFromPhone,
      close: async () => {
        await reports.close();
        await Promise.all(running.map((one) => one.close()));
      },
    };
  } catch (error) {
    await Promise.all(running.map((one) => one.close()));
    throw error;
  }
}
