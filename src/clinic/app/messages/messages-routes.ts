import type { Routes } from '@angular/router';
import { Messages } from './messages';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.messages:Messages · Threedawn`,
    component: Messages,
  },
];
