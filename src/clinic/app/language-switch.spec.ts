import { Component, LOCALE_ID } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { LanguageSwitch } from './language-switch';

@Component({ template: '' })
class Screen {}

async function switchAt(locale: string, url: string): Promise<HTMLAnchorElement[]> {
  TestBed.configureTestingModule({
    providers: [
      provideRouter([{ path: 'this-morning', component: Screen }]),
      { provide: LOCALE_ID, useValue: locale },
    ],
  });
  const fixture = TestBed.createComponent(LanguageSwitch);
  await TestBed.inject(Router).navigateByUrl(url);
  await fixture.whenStable();
  return [...(fixture.nativeElement as HTMLElement).querySelectorAll('a')];
}

test('leads to the same screen in the other language, named in that language', async () => {
  const [link, ...more] = await switchAt('en', '/this-morning?on=2027-04-13');
  expect(more).toEqual([]);
  expect(link?.getAttribute('href')).toBe('/clinic/es/this-morning?on=2027-04-13');
  expect(link?.textContent).toBe('Español');
  expect(link?.lang).toBe('es-US');
});

test('and back', async () => {
  const [link] = await switchAt('es', '/this-morning');
  expect(link?.getAttribute('href')).toBe('/clinic/en/this-morning');
  expect(link?.textContent).toBe('English');
});
