import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  computed,
  inject,
  input,
} from '@angular/core';
import { textPieces } from './text-pieces';

/** The words of a text or mail; links lead to the family's page in a window of a phone's size. */
@Component({
  selector: 'td-pretend-text',
  template: `@for (piece of pieces(); track $index) {
    @if (piece.href) {
      <a [href]="piece.href" target="phone" (click)="open($event, piece.href)">{{ piece.says }}</a>
    } @else {
      {{ piece.says }}
    }
  }`,
  styles: `
    :host {
      white-space: pre-line;
      overflow-wrap: anywhere;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PretendText {
  private readonly window = inject(DOCUMENT).defaultView;
  readonly body = input.required<string>();
  protected readonly pieces = computed(() =>
    textPieces(this.body(), this.window?.location.origin ?? ''),
  );

  /** No page of ours may stand in a frame, so that the phone is a window of its own. */
  protected open(event: Event, href: string): void {
    event.preventDefault();
    this.window?.open(href, 'phone', 'popup,width=390,height=800');
  }
}
