import type { Routes } from '@angular/router';
import { ProtocolEditor } from './protocol-editor';
import { ProtocolList } from './protocol-list';

const title = $localize`:@@clinic.title.fasting-protocol:Fasting protocol · Threedawn`;

export const routes: Routes = [
  { path: '', title, component: ProtocolList },
  { path: ':id', title, component: ProtocolEditor },
];
