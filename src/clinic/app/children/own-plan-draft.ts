import { computed, signal } from '@angular/core';
import type { IndividualPlans } from '../../../../shared/contracts/individual-plans';
import type { Item } from '../../../../shared/domain/fasting-protocol';
import type { PlanPhrase } from '../../../../shared/domain/individual-plan';
import {
  copyOf,
  emptyMedicine,
  ownPlanBody,
  ownPlanFields,
  type MedicineFields,
  type OwnPlanFields,
} from './own-plan-form';

/** What stands in the composer, field by field, until it is signed. */
export class OwnPlanDraft {
  readonly fields = signal<OwnPlanFields>(ownPlanFields());
  /** A series, or days where it is empty. */
  readonly holds = signal({ seriesId: '', from: '', until: '' });
  readonly body = computed(() => ownPlanBody(this.fields()));
  readonly mornings = computed(() => {
    const { seriesId, from, until } = this.holds();
    const dayOf = (day: string): string | null => (seriesId === '' && day !== '' ? day : null);
    return {
      seriesId: seriesId === '' ? null : Number(seriesId),
      from: dayOf(from),
      until: dayOf(until),
    };
  });

  /** From the newest version; for the newest series where there is none yet. */
  start({ versions, series }: IndividualPlans): void {
    const [newest] = versions;
    this.fields.set(ownPlanFields(newest?.body));
    const seriesId = newest ? newest.seriesId : (series[0]?.id ?? null);
    this.holds.set({
      seriesId: seriesId === null ? '' : String(seriesId),
      from: newest?.from ?? '',
      until: newest?.until ?? '',
    });
  }

  /** A change of one field; the fields are replaced, so that everything derived follows. */
  private set(change: (fields: OwnPlanFields) => unknown): void {
    const next = copyOf(this.fields());
    change(next);
    this.fields.set(next);
  }

  hold(more: Partial<{ seriesId: string; from: string; until: string }>): void {
    this.holds.update((holds) => ({ ...holds, ...more }));
  }

  setHours(item: Item, hours: string): void {
    this.set(({ stops }) => (stops[item].hours = hours));
  }

  setFrom(item: Item, from: string): void {
    this.set(({ stops }) => (stops[item].from = from));
  }

  setLongest(hours: string): void {
    this.set((fields) => (fields.longestHours = hours));
  }

  setLastFeed(time: string): void {
    this.set((fields) => (fields.lastFeedTime = time));
  }

  setPhrase(phrase: PlanPhrase, isChosen: boolean): void {
    this.set(({ phrases }) => (phrases[phrase] = isChosen));
  }

  setGlucose(value: string): void {
    this.set((fields) => (fields.glucoseMgDl = value));
  }

  setMedicine(index: number, more: Partial<MedicineFields>): void {
    this.set(({ medicines }) => {
      const medicine = medicines[index];
      if (medicine) medicines[index] = { ...medicine, ...more };
    });
  }

  addMedicine(): void {
    this.set(({ medicines }) => medicines.push({ ...emptyMedicine }));
  }

  dropMedicine(index: number): void {
    this.set(({ medicines }) => medicines.splice(index, 1));
  }
}
