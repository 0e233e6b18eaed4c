import type { Routes } from '@angular/router';
import { WordingScreen } from './wording';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.wording:Wording · Threedawn`,
    component: WordingScreen,
  },
];
