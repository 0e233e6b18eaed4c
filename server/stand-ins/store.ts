import { appendFileSync, existsSync, readFileSync } from 'node:fs';

export interface PretendText {
  readonly id: string;
  /** From the phone ('in') or to it ('out'), as the clinic sees it. */
  readonly direction: 'in' | 'out';
  /** The family's number. */
  readonly phone: string;
  readonly body: string;
  /** Business clock, epoch milliseconds. */
  readonly at: number;
  readonly segments: number;
  readonly statusCallback: string | null;
  status: string;
  errorCode: number | null;
}

export interface PretendMail {
  readonly id: string;
  readonly messageId: string;
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly body: string;
  readonly at: number;
  readonly isAutomatic: boolean;
  readonly attachments: readonly {
    readonly name: string;
    readonly type: string;
    readonly content: string;
  }[];
}

type Line =
  | { readonly text: PretendText }
  | { readonly status: { readonly id: string; readonly is: string; readonly code: number | null } }
  | { readonly mail: PretendMail }
  | { readonly optedOut: { readonly phone: string; readonly is: boolean } };

/** Everything the pretended services hold: in memory, and line by line in a file so that a restart keeps it. */
export class StandInStore {
  readonly texts: PretendText[] = [];
  readonly mails: PretendMail[] = [];
  readonly optedOut = new Set<string>();

  constructor(private readonly file: string | null) {
    if (file === null || !existsSync(file)) return;
    const text = readFileSync(file, 'utf8');
    for (const line of text.split('\n')) this.read(line);
    if (text !== '' && !text.endsWith('\n')) appendFileSync(file, '\n');
  }

  addText(text: PretendText): void {
    this.keep({ text });
  }

  setStatus(id: string, is: string, code: number | null = null): void {
    this.keep({ status: { id, is, code } });
  }

  addMail(mail: PretendMail): void {
    this.keep({ mail });
  }

  setOptedOut(phone: string, is: boolean): void {
    this.keep({ optedOut: { phone, is } });
  }

  private keep(line: Line): void {
    this.apply(line);
    if (this.file !== null) appendFileSync(this.file, `${JSON.stringify(line)}\n`, { mode: 0o600 });
  }

  private read(line: string): void {
    if (line === '') return;
    try {
      this.apply(JSON.parse(line) as Line);
    } catch {
      // A line that was cut off when the process was killed: the pretended service has not taken it.
    }
  }

  private apply(line: Line): void {
    if ('text' in line) this.texts.push({ ...line.text });
    else if ('mail' in line) this.mails.push(line.mail);
    else if ('optedOut' in line) {
      if (line.optedOut.is) this.optedOut.add(line.optedOut.phone);
      else this.optedOut.delete(line.optedOut.phone);
    } else {
      const text = this.texts.find(({ id }) => id === line.status.id);
      if (!text) return;
      text.status = line.status.is;
      text.errorCode = line.status.code;
    }
  }
}
