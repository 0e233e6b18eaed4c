import type { Routes } from '@angular/router';
import { Specimens } from './specimens';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.specimens:Specimens · Threedawn`,
    component: Specimens,
  },
];
