import type { Routes } from '@angular/router';
import { SetUpScreen } from './set-up';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.set-up:Set-up · Threedawn`,
    component: SetUpScreen,
  },
];
