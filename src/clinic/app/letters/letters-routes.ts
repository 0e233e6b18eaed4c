import type { Routes } from '@angular/router';

const title = $localize`:@@clinic.title.letters:Letters · Threedawn`;

export const routes: Routes = [
  { path: '', title, loadComponent: () => import('./letters').then((file) => file.Letters) },
  {
    path: ':seriesId',
    title,
    loadComponent: () => import('./letter-desk').then((file) => file.LetterDeskScreen),
  },
];
