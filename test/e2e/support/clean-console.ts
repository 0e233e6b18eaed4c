import type { BrowserContext } from '@playwright/test';

/**
 * Gathers what the pages of a context complain about. A failed request is a complaint of the browser's own, so that a
 * test which causes one on purpose says so with `expecting`.
 */
export class CleanConsole {
  readonly complaints: string[] = [];
  private readonly expected: RegExp[] = [];

  watch(context: BrowserContext): void {
    context.on('console', (message) => {
      if (!['error', 'warning'].includes(message.type())) return;
      this.note(`${message.type()}: ${message.text()} (${message.location().url})`);
    });
    context.on('weberror', (webError) => this.note(`thrown: ${String(webError.error())}`));
  }

  /** What this test causes on purpose, for example a refusal by the server. */
  expecting(...complaints: readonly RegExp[]): void {
    this.expected.push(...complaints);
  }

  private note(text: string): void {
    if (!this.expected.some((pattern) => pattern.test(text))) this.complaints.push(text);
  }
}
