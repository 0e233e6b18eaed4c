import type { Routes } from '@angular/router';
import { Alerts } from './alerts';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.alerts:Alerts · Threedawn`,
    component: Alerts,
  },
];
