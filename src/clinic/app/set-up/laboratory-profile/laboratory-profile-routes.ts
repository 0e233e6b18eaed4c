import type { Routes } from '@angular/router';
import { ProfileEditor } from './profile-editor';
import { ProfileList } from './profile-list';

const title = $localize`:@@clinic.title.laboratory-profile:Laboratory profile · Threedawn`;

export const routes: Routes = [
  { path: '', title, component: ProfileList },
  { path: ':id', title, component: ProfileEditor },
];
