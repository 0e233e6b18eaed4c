import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { ShownTime } from '../../../../shared/contracts/family-morning';

/** A time as the server wrote it, digits first and largest: '7:00 in the morning'. */
@Component({
  selector: 'td-shown-clock',
  template: `<time [attr.datetime]="time().at"
      ><bdi>{{ time().clock }}</bdi></time
    >
    {{ time().dayPart }}`,
  host: { class: 'clock' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShownClock {
  readonly time = input.required<ShownTime>();
}
