import type { Routes } from '@angular/router';
import { needsRight } from '../../../common/session/needs-right';
import { ThisMorning } from './this-morning';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.this-morning:This morning · Threedawn`,
    component: ThisMorning,
  },
  {
    path: 'close',
    canActivate: [needsRight('mornings.close')],
    title: $localize`:@@clinic.title.close-morning:Close a morning · Threedawn`,
    loadComponent: () => import('./close-morning').then((file) => file.CloseMorning),
  },
];
