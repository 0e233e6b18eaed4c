import type { RequestHandler } from 'express';
import { can, isRole } from '../../shared/access/rights';
import type { Right } from '../../shared/access/rights';
import { Problem } from '../http/problem';
import { staffMemberOf } from './current-user';

/**
 * Step of a clinic ladder: lets a staff member pass whose roles grant the right. The ladder carries the right's
 * name, so that a test can walk over every mounted route.
 */
export function right(name: Right): RequestHandler & { readonly right: Right } {
  const step: RequestHandler = (req, _res, next) => {
    const { staff } = staffMemberOf(req);
    if (!can(staff.roles.filter(isRole), name))
      throw new Problem(403, 'not-allowed', 'Your roles do not include this.', { right: name });
    next();
  };
  return Object.assign(step, { right: name });
}
