import type { CanActivateFn, Routes } from '@angular/router';
import { signedInFamily } from '../../common/session/family-guard';

const nextMorning = () =>
  import('./next-morning/next-morning').then((file) => file.NextMorningPage);
const morningQuestion = () =>
  import('./morning-question/morning-question').then((file) => file.MorningQuestionPage);

/** Fetches a screen while the clinic is asked who is here, not after: one trip less on a bad line. */
const meanwhile =
  (fetchScreen: () => Promise<unknown>): CanActivateFn =>
  () => {
    // What did not come is asked for again, and its failure told, when the screen is opened.
    fetchScreen().catch(() => undefined);
    return true;
  };

// Each screen comes when it is opened; the worker fetches the rest once the first one stands.
export const routes: Routes = [
  {
    path: '',
    pathMatch: 'full',
    loadComponent: nextMorning,
    canActivate: [meanwhile(nextMorning), signedInFamily],
  },
  {
    path: 'morning',
    loadComponent: morningQuestion,
    canActivate: [meanwhile(morningQuestion), signedInFamily],
  },
  {
    path: 'say-it-back',
    loadComponent: () => import('./say-it-back/say-it-back').then((file) => file.SayItBackPage),
    canActivate: [signedInFamily],
  },
  {
    path: 'calendar',
    loadComponent: () =>
      import('./calendar/family-calendar').then((file) => file.FamilyCalendarPage),
    canActivate: [signedInFamily],
  },
  {
    path: 'letters',
    loadComponent: () => import('./letters/letter-list').then((file) => file.LetterList),
    canActivate: [signedInFamily],
  },
  {
    path: 'letters/:letterId',
    loadComponent: () => import('./letters/letter-page').then((file) => file.LetterPage),
    canActivate: [signedInFamily],
  },
  { path: 'i/:token', loadComponent: () => import('./arrive/arrive').then((file) => file.Arrive) },
  { path: 'm/:token', loadComponent: () => import('./arrive/arrive').then((file) => file.Arrive) },
  {
    path: 'code',
    loadComponent: () => import('./code/sign-in-by-code').then((file) => file.SignInByCode),
  },
  {
    path: 'interpreter',
    loadComponent: () =>
      import('./interpreter/ask-interpreter').then((file) => file.AskInterpreter),
  },
  {
    path: '**',
    loadComponent: () => import('./not-found/not-found').then((file) => file.NotFound),
  },
];
