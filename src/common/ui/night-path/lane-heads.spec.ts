/// <reference types="node" />
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { registerLocaleData } from '@angular/common';
import arabic from '@angular/common/locales/ar';
import { LOCALE_ID } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { clearTranslations, loadTranslations } from '@angular/localize';
import type { NextMorning } from '../../../../shared/contracts/family-morning';
import { LaneHeads } from './lane-heads';

const file = join(__dirname, '../../../../locales/ui/family.ar.xlf');

/** What the build puts in place of the English: the text of each unit, values as names in braces. */
function translations(): Record<string, string> {
  const units = readFileSync(file, 'utf8').matchAll(
    /<unit id="(family\.path\.[^"]*)">[\s\S]*?<target>([\s\S]*?)<\/target>/g,
  );
  return Object.fromEntries(
    [...units].map(([, id = '', target = '']) => [
      id,
      target.replace(/<ph [^>]*equiv="([^"]*)"[^>]*\/>/g, '{$1}'),
    ]),
  );
}

const stopAt = '2027-04-13T10:00:00.000Z';
const child: NextMorning['children'][number] = {
  childId: 1,
  morningId: 2,
  callMe: 'Maryam',
  face: 'baby',
  headSays: 'حتى',
  stopAt: { at: stopAt, clock: '3:00', dayPart: 'ليلًا' },
  individualPlanSays: null,
};

describe('what is left, where a language has six forms of a number', () => {
  beforeAll(() => {
    registerLocaleData(arabic);
    loadTranslations(translations());
  });
  afterAll(clearTranslations);

  it.each([
    [1, 'بقيت دقيقة واحدة'],
    [2, 'بقيت دقيقتان'],
    [11, 'بقيت 11 دقيقة'],
    [60, 'بقيت ساعة واحدة'],
    [61, 'بقيت ساعة واحدة ودقيقة واحدة'],
    [65, 'بقيت ساعة واحدة و5 دقائق'],
    [80, 'بقيت ساعة واحدة و20 دقيقة'],
    [122, 'بقيت ساعتان ودقيقتان'],
    [180, 'بقيت 3 ساعات'],
    [320, 'بقيت 5 ساعات و20 دقيقة'],
    [690, 'بقيت 11 ساعة و30 دقيقة'],
  ])('%i minutes read %s', async (minutes, expected) => {
    TestBed.configureTestingModule({ providers: [{ provide: LOCALE_ID, useValue: 'ar' }] });
    const fixture = TestBed.createComponent(LaneHeads);
    fixture.componentRef.setInput('children', [child]);
    fixture.componentRef.setInput('now', Date.parse(stopAt) - minutes * 60_000);
    await fixture.whenStable();
    const left = (fixture.nativeElement as HTMLElement).querySelector('.left');
    expect(left?.textContent.trim()).toBe(expected);
  });
});
