import type { Routes } from '@angular/router';
import { ThisMorning } from './this-morning';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.this-morning:This morning · Threedawn`,
    component: ThisMorning,
  },
];
