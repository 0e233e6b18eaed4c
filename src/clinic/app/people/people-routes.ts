import type { Routes } from '@angular/router';
import { People } from './people';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.people:Staff · Threedawn`,
    component: People,
  },
];
