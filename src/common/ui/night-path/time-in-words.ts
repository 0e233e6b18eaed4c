import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

/** Words as the server wrote them, with the time in them as the largest thing: 'Before **3:00** at night'. */
@Component({
  selector: 'td-time-in-words',
  template: `{{ parts().before }}
    @if (parts().time) {
      <b class="digits"
        ><bdi>{{ parts().time }}</bdi></b
      >
    }
    {{ parts().after }}`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TimeInWords {
  readonly words = input.required<string>();
  protected readonly parts = computed(() => {
    const words = this.words();
    const found = /\d{1,2}:\d{2}/.exec(words);
    if (found === null) return { before: words, time: '', after: '' };
    const end = found.index + found[0].length;
    return { before: words.slice(0, found.index), time: found[0], after: words.slice(end) };
  });
}
