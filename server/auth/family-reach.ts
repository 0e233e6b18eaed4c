import type { RequestHandler } from 'express';
import { Problem } from '../http/problem';
import { familyVisitorOf } from './current-user';
import type { FamilyVisitor } from './current-user';

export type Reach = FamilyVisitor['reach'];

/**
 * Step of a family ladder. 'household' lets every signed-in family member pass; 'fresh' only one who entered a code
 * within the last minutes (letters, contact changes), also on a remembered phone. A helper never reaches 'fresh'.
 */
export function familyReach(reach: Reach): RequestHandler & { readonly reach: Reach } {
  const step: RequestHandler = (req, _res, next) => {
    const { visitor } = familyVisitorOf(req);
    if (reach === 'fresh' && visitor.reach !== 'fresh')
      throw new Problem(403, 'code-needed', 'Enter a new code first.');
    next();
  };
  return Object.assign(step, { reach });
}
