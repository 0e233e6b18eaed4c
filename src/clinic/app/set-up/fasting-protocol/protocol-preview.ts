import { ChangeDetectionStrategy, Component, computed, input, model, signal } from '@angular/core';
import type { ProtocolCheck } from '../../../../../shared/contracts/protocols';

export interface PreviewWanted {
  readonly language: string;
  readonly arrivalTime: string;
  readonly on: string | null;
}

/** What a family of one age would read with these hours, in its own language and on a night of its own. */
@Component({
  selector: 'td-protocol-preview',
  templateUrl: './protocol-preview.html',
  styleUrl: './protocol-preview.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProtocolPreview {
  readonly check = input.required<ProtocolCheck | null>();
  readonly wanted = model.required<PreviewWanted>();

  protected readonly shown = computed(() => this.check()?.preview ?? null);
  protected readonly chosen = signal(1);
  /** Bands come and go while they are edited; the nearest one stays on show. */
  protected readonly one = computed(() => {
    const bands = this.shown()?.bands ?? [];
    return bands[Math.min(this.chosen(), bands.length - 1)] ?? null;
  });

  protected change(part: Partial<PreviewWanted>): void {
    this.wanted.update((wanted) => ({ ...wanted, ...part }));
  }
}
