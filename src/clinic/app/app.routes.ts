import type { Routes } from '@angular/router';
import { needsRight } from '../../common/session/needs-right';

/** A folder a matter, each loaded when it is opened. Titles name the screen, never a child. */
export const routes: Routes = [
  { path: '', pathMatch: 'full', redirectTo: 'this-morning' },
  {
    path: 'sign-in',
    title: $localize`:@@clinic.title.sign-in:Sign in · Threedawn`,
    loadComponent: () => import('./sign-in/sign-in').then((file) => file.SignIn),
  },
  {
    path: 'join/:token',
    title: $localize`:@@clinic.title.join:Choose a password · Threedawn`,
    loadComponent: () => import('./sign-in/join').then((file) => file.Join),
  },
  {
    path: 'this-morning',
    canActivate: [needsRight('mornings.read')],
    loadChildren: () => import('./this-morning/this-morning-routes').then((file) => file.routes),
  },
  {
    path: 'calls',
    canActivate: [needsRight('calls.read')],
    loadChildren: () => import('./calls/calls-routes').then((file) => file.routes),
  },
  {
    path: 'alerts',
    canActivate: [needsRight('alerts.take')],
    loadChildren: () => import('./alerts/alerts-routes').then((file) => file.routes),
  },
  {
    path: 'orders',
    canActivate: [needsRight('children.read')],
    loadChildren: () => import('./orders/orders-routes').then((file) => file.routes),
  },
  {
    path: 'children',
    canActivate: [needsRight('children.read')],
    loadChildren: () => import('./children/children-routes').then((file) => file.routes),
  },
  {
    path: 'series',
    canActivate: [needsRight('series.plan')],
    loadChildren: () => import('./series/series-routes').then((file) => file.routes),
  },
  {
    path: 'set-out',
    canActivate: [needsRight('mornings.run')],
    loadChildren: () => import('./set-out/set-out-routes').then((file) => file.routes),
  },
  {
    path: 'specimens',
    canActivate: [needsRight('specimens.read')],
    loadChildren: () => import('./specimens/specimens-routes').then((file) => file.routes),
  },
  {
    path: 'results',
    canActivate: [needsRight('results.read')],
    loadChildren: () => import('./results/results-routes').then((file) => file.routes),
  },
  {
    path: 'letters',
    canActivate: [needsRight('letters.read')],
    loadChildren: () => import('./letters/letters-routes').then((file) => file.routes),
  },
  {
    path: 'messages',
    canActivate: [needsRight('messages.read')],
    loadChildren: () => import('./messages/messages-routes').then((file) => file.routes),
  },
  {
    path: 'wording',
    canActivate: [needsRight('wording.read')],
    loadChildren: () => import('./wording/wording-routes').then((file) => file.routes),
  },
  {
    path: 'set-up',
    canActivate: [needsRight('set-up.read')],
    loadChildren: () => import('./set-up/set-up-routes').then((file) => file.routes),
  },
  {
    path: 'people',
    canActivate: [needsRight('people.read')],
    loadChildren: () => import('./people/people-routes').then((file) => file.routes),
  },
  {
    path: 'access-record',
    canActivate: [needsRight('access-record.read')],
    loadChildren: () => import('./access-record/access-record-routes').then((file) => file.routes),
  },
  {
    path: 'rehearsal',
    canActivate: [needsRight('rehearsal.use')],
    loadChildren: () => import('./rehearsal/rehearsal-routes').then((file) => file.routes),
  },
  {
    path: '**',
    title: $localize`:@@clinic.title.not-found:Not found · Threedawn`,
    loadComponent: () => import('./sign-in/not-found').then((file) => file.NotFound),
  },
];
