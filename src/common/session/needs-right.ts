import { inject } from '@angular/core';
import { type CanActivateFn, Router } from '@angular/router';
import type { Right } from '../../../shared/access/rights';
import { ClinicUser } from './clinic-user';

/** Opens a screen to those who hold the right; others go to sign-in, or to the first screen they may open. */
export const needsRight =
  (right: Right): CanActivateFn =>
  async (_route, state) => {
    const user = inject(ClinicUser);
    const router = inject(Router);
    const session = await user.known();
    if (session === null)
      return router.createUrlTree(['/sign-in'], { queryParams: { back: state.url } });
    if (user.has(right)) return true;
    const first = firstScreens.find(([, needed]) => user.has(needed));
    return router.createUrlTree([first?.[0] ?? '/nothing-to-open']);
  };

const firstScreens: readonly (readonly [string, Right])[] = [
  ['/this-morning', 'mornings.read'],
  ['/calls', 'calls.read'],
  ['/children', 'children.read'],
  ['/wording', 'wording.read'],
  ['/set-up', 'set-up.read'],
  ['/people', 'people.read'],
];
