import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { NextMorning } from '../../../../shared/contracts/family-morning';
import { PictureMark } from '../picture/picture-mark';
import { PathLanes } from './path-lanes';
import { pathParts, type PathPart } from './path-rows';
import { PathStepText } from './path-step';

const partPictures = { evening: 'dusk', night: 'moon', morning: 'dawn' } as const;

/** One vertical path through the night: evening on paper, night on deep ink, morning on first light. */
@Component({
  selector: 'td-night-path',
  imports: [PathLanes, PathStepText, PictureMark],
  templateUrl: './night-path.html',
  host: { class: 'path', '[style.--children]': 'morning().children.length || 1' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NightPath {
  readonly morning = input.required<Pick<NextMorning, 'children' | 'steps' | 'parts'>>();
  /** Epoch milliseconds by the clinic's clock. */
  readonly now = input.required<number>();
  /** The sentence of the moment, for the flag. */
  readonly says = input('');
  /** Only what is still to come, for the page after an answer. */
  readonly isRestOnly = input(false);

  protected readonly parts = computed<PathPart[]>(() => {
    const parts = pathParts(this.morning(), this.now());
    return this.isRestOnly() ? restOf(parts) : parts;
  });

  protected picture(part: PathPart['part']): string {
    return partPictures[part];
  }
}

function restOf(parts: readonly PathPart[]): PathPart[] {
  return parts
    .map((part) => ({
      ...part,
      rows: part.rows.filter((row) => row.kind === 'step' && !row.isPast),
    }))
    .filter((part) => part.rows.length > 0);
}
