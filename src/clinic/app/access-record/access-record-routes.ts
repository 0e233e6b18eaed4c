import type { Routes } from '@angular/router';
import { AccessRecord } from './access-record';

export const routes: Routes = [
  {
    path: '',
    title: $localize`:@@clinic.title.access-record:Access record · Threedawn`,
    component: AccessRecord,
  },
];
