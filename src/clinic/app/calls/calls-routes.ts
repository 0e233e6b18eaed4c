import type { Routes } from '@angular/router';
import { Calls } from './calls';

export const routes: Routes = [
  { path: '', title: $localize`:@@clinic.title.calls:Calls to make · Threedawn`, component: Calls },
];
