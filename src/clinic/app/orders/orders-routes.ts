import type { Routes } from '@angular/router';
import { needsRight } from '../../../common/session/needs-right';

const title = $localize`:@@clinic.title.orders:Orders · Threedawn`;

export const routes: Routes = [
  { path: '', title, loadComponent: () => import('./orders').then((file) => file.Orders) },
  {
    path: 'new',
    title,
    canActivate: [needsRight('orders.write')],
    loadComponent: () => import('./add-order').then((file) => file.AddOrder),
  },
  {
    path: ':orderId',
    title,
    loadComponent: () => import('./order-page').then((file) => file.OrderPage),
  },
];
