import type { Routes } from '@angular/router';
import { Results } from './results';

export const routes: Routes = [
  { path: '', title: $localize`:@@clinic.title.results:Results · Threedawn`, component: Results },
];
