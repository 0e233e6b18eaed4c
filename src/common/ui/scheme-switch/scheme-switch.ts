import { ChangeDetectionStrategy, Component, signal } from '@angular/core';

type Scheme = 'light' | 'dark';
const kept = 'threedawn-scheme';

/** Switches between day and night; the device decides until the reader chooses. The choice is kept on this device. */
@Component({
  selector: 'td-scheme-switch',
  template: `<button
    type="button"
    [attr.aria-pressed]="isDark()"
    (click)="turn()"
    i18n-aria-label="@@ui.scheme.label"
    aria-label="Dark colours"
  >
    <svg viewBox="0 0 20 20" aria-hidden="true">
      <circle cx="10" cy="10" r="7" />
      <path d="M10 3a7 7 0 0 0 0 14Z" />
    </svg>
  </button>`,
  styles: `
    button {
      display: grid;
      place-items: center;
      min-width: var(--control, var(--target));
      min-height: var(--control, var(--target));
      border: 0;
      background: none;
      color: inherit;
      cursor: pointer;
    }
    svg {
      width: 1.25rem;
      height: 1.25rem;
      fill: none;
      stroke: currentColor;
      stroke-width: 2;
    }
    path {
      fill: currentColor;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SchemeSwitch {
  protected readonly isDark = signal(this.start());

  protected turn(): void {
    const scheme: Scheme = this.isDark() ? 'light' : 'dark';
    this.isDark.set(scheme === 'dark');
    document.documentElement.dataset['scheme'] = scheme;
    try {
      localStorage.setItem(kept, scheme);
    } catch {
      // Storage can be switched off; the choice then lasts for this page.
    }
  }

  private start(): boolean {
    const chosen = keptScheme();
    if (chosen === 'light' || chosen === 'dark') {
      document.documentElement.dataset['scheme'] = chosen;
      return chosen === 'dark';
    }
    return globalThis.matchMedia?.('(prefers-color-scheme: dark)').matches ?? false;
  }
}

function keptScheme(): string | null {
  try {
    return localStorage.getItem(kept);
  } catch {
    return null;
  }
}
