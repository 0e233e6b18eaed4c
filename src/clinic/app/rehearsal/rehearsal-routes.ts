import type { Routes } from '@angular/router';
import { Rehearsal } from './rehearsal';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.rehearsal:Rehearsal · Threedawn`,
    component: Rehearsal,
  },
];
