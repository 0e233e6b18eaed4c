import type { Routes } from '@angular/router';
import { needsRight } from '../../../common/session/needs-right';
import { SetUpScreen } from './set-up';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.set-up:Set-up · Threedawn`,
    component: SetUpScreen,
  },
  {
    path: 'site/:siteId',
    canActivate: [needsRight('set-up.write')],
    title: $localize`:@@clinic.title.site:Site · Threedawn`,
    loadComponent: () => import('./site-screen').then((file) => file.SiteScreen),
  },
  {
    path: 'rooms',
    canActivate: [needsRight('set-up.write')],
    title: $localize`:@@clinic.title.rooms:Rooms · Threedawn`,
    loadComponent: () => import('./rooms').then((file) => file.Rooms),
  },
  {
    path: 'calendar',
    title: $localize`:@@clinic.title.calendar:Closures and holidays · Threedawn`,
    loadComponent: () => import('./calendar').then((file) => file.SiteCalendar),
  },
  {
    path: 'on-call',
    title: $localize`:@@clinic.title.on-call:On call · Threedawn`,
    loadComponent: () => import('./on-call/on-call').then((file) => file.OnCall),
  },
  {
    path: 'fasting-protocol',
    canActivate: [needsRight('protocols.read')],
    loadChildren: () =>
      import('./fasting-protocol/fasting-protocol-routes').then((file) => file.routes),
  },
  {
    path: 'laboratory-profile',
    canActivate: [needsRight('protocols.read')],
    loadChildren: () =>
      import('./laboratory-profile/laboratory-profile-routes').then((file) => file.routes),
  },
];
