import type { Routes } from '@angular/router';
import { needsRight } from '../../../common/session/needs-right';

const title = $localize`:@@clinic.title.children:Children · Threedawn`;

export const routes: Routes = [
  { path: '', title, loadComponent: () => import('./children').then((file) => file.Children) },
  {
    path: 'new',
    title,
    canActivate: [needsRight('children.write')],
    loadComponent: () => import('./add-child').then((file) => file.AddChild),
  },
  {
    path: ':childId',
    title,
    loadComponent: () => import('./child-record').then((file) => file.ChildRecordScreen),
  },
  {
    path: ':childId/plan',
    title,
    canActivate: [needsRight('individual-plans.sign')],
    loadComponent: () => import('./own-plan').then((file) => file.OwnPlan),
  },
  {
    path: ':childId/family-members/new',
    title,
    canActivate: [needsRight('children.write')],
    loadComponent: () => import('./add-family-member').then((file) => file.AddFamilyMember),
  },
];
