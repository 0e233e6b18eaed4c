import { letterPage } from './letter-page';

const body = {
  title: 'يوسف: الفحص',
  clinicName: 'Alder Street',
  dateSays: 'الثلاثاء 6 أبريل',
  paragraphs: [
    { key: 'whom-to-call', heading: null, text: 'اتصلوا: 312-555-0142', tone: 'plain' as const },
    { key: 'next-visit', heading: '<b>', text: '10:00 & <script>', tone: 'do' as const },
  ],
  wordingVersions: {},
};
const page = letterPage({
  body,
  language: 'ar',
  recipient: 'Nia <img src=x>',
  letterhead: ['Alder Street', '48 Alder Street', '312-555-0142'],
});

test('the page runs from right to left and says its language', () => {
  expect(page).toContain('<html lang="ar" dir="rtl">');
});

test('an address, a name and a telephone number keep their own direction', () => {
  expect(page).toContain('<bdi>48 Alder Street</bdi>');
  expect(page).toContain('<bdi dir="ltr">312-555-0142</bdi>');
  expect(page).toContain('<bdi dir="ltr">10:00</bdi>');
});

test('nothing in a letter becomes markup', () => {
  expect(page).not.toMatch(/<img|<script|<h2><b>/);
});
