import {
  provideAppInitializer,
  provideBrowserGlobalErrorListeners,
  provideEnvironmentInitializer,
  inject,
  type ApplicationConfig,
} from '@angular/core';
import { TitleStrategy, provideRouter, withComponentInputBinding } from '@angular/router';
import { FamilyScheme } from '../../common/session/family-scheme';
import { routes } from './app.routes';
import { NeutralTitle } from './neutral-title';
import { registerWorker } from './worker';

export const appConfig: ApplicationConfig = {
  providers: [
    provideBrowserGlobalErrorListeners(),
    provideEnvironmentInitializer(() => inject(FamilyScheme).begin()),
    provideRouter(routes, withComponentInputBinding()),
    provideAppInitializer(() => registerWorker()),
    { provide: TitleStrategy, useClass: NeutralTitle },
  ],
};
