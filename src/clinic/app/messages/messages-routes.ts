import type { Routes } from '@angular/router';
import { needsRight } from '../../../common/session/needs-right';
import { Messages } from './messages';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.messages:Messages · Threedawn`,
    component: Messages,
  },
  {
    path: 'consents/:familyMemberId',
    title: $localize`:@@clinic.title.consents:What was agreed to · Threedawn`,
    canActivate: [needsRight('contacts.read')],
    loadComponent: () => import('./consents').then((file) => file.Consents),
  },
];
