import { Component, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { PageHeading } from './page-heading';

@Component({
  imports: [PageHeading],
  template: `@if (isLoaded()) {
      <h1 [tdPageHeading]="key()" [textContent]="'Loaded'"></h1>
    } @else {
      <h1 [tdPageHeading]="key()" [textContent]="'Loading'"></h1>
    }
    <button type="button" [textContent]="'Other'"></button>`,
})
class Page {
  readonly key = signal('first');
  readonly isLoaded = signal(false);
}

async function page() {
  const fixture = TestBed.createComponent(Page);
  document.body.append(fixture.nativeElement as HTMLElement);
  await fixture.whenStable();
  const settle = async () => {
    await fixture.whenStable();
    await Promise.resolve();
  };
  return { fixture, settle, here: fixture.componentInstance };
}

const focused = () => document.activeElement?.textContent;

describe('the page heading', () => {
  beforeAll(() => (window.scrollTo = jest.fn()));

  it('leaves the focus alone on the first page', async () => {
    const { here, settle } = await page();
    here.isLoaded.set(true);
    await settle();
    expect(document.activeElement).toBe(document.body);
  });

  it('takes focus on another page, and keeps it when the content replaces the skeleton', async () => {
    const { here, settle } = await page();
    here.key.set('second');
    await settle();
    expect(focused()).toBe('Loading');
    here.isLoaded.set(true);
    await settle();
    expect(focused()).toBe('Loaded');
  });

  it('does not take the focus from a control of the same page', async () => {
    const { fixture, here, settle } = await page();
    here.key.set('second');
    await settle();
    (fixture.nativeElement as HTMLElement).querySelector('button')?.focus();
    here.isLoaded.set(true);
    await settle();
    expect(focused()).toBe('Other');
  });
});
