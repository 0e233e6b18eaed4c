import type { Routes } from '@angular/router';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.set-out:Set out · Threedawn`,
    loadComponent: () => import('./set-out').then((file) => file.SetOutScreen),
  },
  {
    path: 'list',
    title: $localize`:@@clinic.title.supply-list:Supply list · Threedawn`,
    loadComponent: () => import('./supply-list').then((file) => file.SupplyListScreen),
  },
];
