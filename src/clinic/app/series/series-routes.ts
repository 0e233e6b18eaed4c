import type { Routes } from '@angular/router';
import { PlanSeries } from './plan-series';

export const routes: Routes = [
  {
    path: 'plan',
    title: $localize`:@@clinic.title.plan:Plan · Threedawn`,
    component: PlanSeries,
  },
];
