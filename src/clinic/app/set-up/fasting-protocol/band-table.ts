import { ChangeDetectionStrategy, Component, input, signal } from '@angular/core';
import { ReactiveFormsModule, type FormArray } from '@angular/forms';
import type { BandBeside } from '../../../../../shared/contracts/protocols';
import { items } from '../../../../../shared/domain/fasting-protocol';
import {
  alignBands,
  everythingOf,
  removeBand,
  setEverything,
  splitBand,
  type BandForm,
} from './protocol-form';
import { itemWords } from './protocol-words';

/**
 * Age bands with their hours. One number holds for everything by mouth; a row opens into its items where they differ.
 * What is published stands beside each row.
 */
@Component({
  selector: 'td-band-table',
  imports: [ReactiveFormsModule],
  templateUrl: './band-table.html',
  styleUrl: './band-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BandTable {
  readonly bands = input.required<FormArray<BandForm>>();
  readonly beside = input<readonly BandBeside[]>([]);
  readonly faults = input<ReadonlyMap<string, string>>(new Map());
  readonly isOpenForChange = input(false);

  protected readonly items = items;
  protected readonly itemWords = itemWords;
  protected readonly tableSays = $localize`:@@clinic.bands.table:Hours by age`;
  protected readonly heads = {
    upTo: $localize`:@@clinic.bands.up-to:Up to, months`,
    least: $localize`:@@clinic.bands.least:Everything by mouth, least hours`,
    longest: $localize`:@@clinic.bands.longest:Longest fast, hours`,
    nothingFrom: $localize`:@@clinic.bands.nothing-from:Nothing from, clock`,
    varies: $localize`:@@clinic.bands.varies:varies`,
  };
  protected readonly opened = signal<BandForm | null>(null);
  protected readonly everythingOf = everythingOf;

  protected turn(band: BandForm): void {
    this.opened.update((now) => (now === band ? null : band));
  }

  protected everything(band: BandForm, typed: string): void {
    setEverything(band, typed === '' ? null : Number(typed));
  }

  protected aged(): void {
    alignBands(this.bands());
  }

  protected split(index: number): void {
    splitBand(this.bands(), index);
  }

  protected remove(index: number): void {
    removeBand(this.bands(), index);
  }

  protected fault(index: number, field: string): string | undefined {
    return this.faults().get(`bands.${index}.${field}`);
  }

  /** Faults of single items are told at the one number while the row is closed. */
  protected everythingFault(index: number): string | undefined {
    const own = this.fault(index, 'leastHours');
    if (own) return own;
    const [first] = items.flatMap((item) => this.fault(index, `leastHours.${item}`) ?? []);
    return first;
  }
}
