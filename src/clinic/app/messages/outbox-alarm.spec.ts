import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { OutboxState } from '../../../../shared/contracts/messages';
import { MessagesClient } from '../../../common/api/clinic/messages-client';
import { OutboxAlarm } from './outbox-alarm';

const calm: OutboxState = {
  ...{ waiting: 0, oldestDueAt: null, isStuck: false, failures: 0 },
  says: 'Everything that was due has gone out.',
};
const stuck: OutboxState = {
  ...{ waiting: 2, oldestDueAt: '2026-12-08T02:00:00.000Z', isStuck: true, failures: 0 },
  says: 'Texts are not going out: 2 messages are due.',
};

async function alarmWith(outbox: () => Promise<OutboxState>): Promise<HTMLElement> {
  TestBed.configureTestingModule({
    providers: [provideRouter([]), { provide: MessagesClient, useValue: { outbox } }],
  });
  const fixture = TestBed.createComponent(OutboxAlarm);
  await fixture.whenStable();
  const element = fixture.nativeElement as HTMLElement;
  fixture.destroy();
  return element;
}

test('says that nothing goes out, and where to go', async () => {
  const element = await alarmWith(() => Promise.resolve(stuck));
  expect(element.querySelector('[role=alert]')?.textContent).toContain(stuck.says);
  const links = [...element.querySelectorAll('a')].map((link) => link.getAttribute('href'));
  expect(links).toEqual(['/calls', '/messages?show=waiting']);
});

test('says nothing while all goes out', async () => {
  const element = await alarmWith(() => Promise.resolve(calm));
  expect(element.textContent?.trim()).toBe('');
});

test('claims nothing when it could not ask', async () => {
  const element = await alarmWith(() => Promise.reject(new Error('away')));
  expect(element.textContent?.trim()).toBe('');
});
