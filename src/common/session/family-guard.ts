import { inject } from '@angular/core';
import { Router, type CanActivateFn } from '@angular/router';
import { FamilyVisit } from './family-visit';

/** Lets a family in that is signed in, or was when the phone last had signal; everybody else gets a code first. */
export const signedInFamily: CanActivateFn = async () => {
  const visit = inject(FamilyVisit);
  const router = inject(Router);
  if (visit.session() !== null) return true;
  try {
    return (await visit.load()) !== null ? true : router.parseUrl('/code');
  } catch {
    // Not reached and nothing kept: the screen itself says so and offers to try again.
    return true;
  }
};
