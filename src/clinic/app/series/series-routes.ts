import type { Routes } from '@angular/router';

export const routes: Routes = [
  {
    path: 'plan',
    title: $localize`:@@clinic.title.plan:Plan · Threedawn`,
    loadComponent: () => import('./plan-series').then((file) => file.PlanSeries),
  },
  {
    path: 'replan',
    title: $localize`:@@clinic.title.replan:Re-plan · Threedawn`,
    loadComponent: () => import('./replan-series').then((file) => file.ReplanSeries),
  },
];
