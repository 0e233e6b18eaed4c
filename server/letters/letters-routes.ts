import { Router, type Response } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { letterChoices, signLetterRequest } from '../../shared/contracts/letters';
import { familyReach } from '../auth/family-reach';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle, handleFamily } from '../http/handle';
import { listFamilyLetters, openFamilyLetter } from './family-letters';
import { openLetterDesk } from './letter-desk';
import { listLetters } from './letter-list';
import { printLetterForClinic, printLetterForFamily } from './letter-pdf';
import { releaseLetter } from './release-letter';
import { signLetter } from './sign-letter';

const params = z.object({ id: idInPath });

function sendPdf(res: Response, pdf: Buffer): void {
  res
    .set('Cache-Control', 'no-store')
    .set('Content-Disposition', 'inline; filename="letter.pdf"')
    .type('application/pdf')
    .send(pdf);
}

/**
 * GET  /letters                   to write, to release, released and read
 * POST /series/:id/letter-desk    the letter that the results allow, with the choices made so far; writes nothing
 * POST /series/:id/letters        sign, and release
 * POST /letters/:id/release       release a signed letter
 * GET  /letters/:id.pdf           for paper
 */
export function lettersRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/letters',
    right('letters.read'),
    handle({}, ({ actor, staff }) => listLetters(context, actor, staff)),
  );
  router.get(
    '/letters/:id.pdf',
    right('letters.read'),
    handle({ params }, async ({ params: { id }, actor, staff, res }) =>
      sendPdf(res, await printLetterForClinic(context, actor, staff, id)),
    ),
  );
  router.post(
    '/series/:id/letter-desk',
    right('letters.write'),
    handle({ params, body: letterChoices }, ({ params: { id }, body, actor, staff }) =>
      openLetterDesk(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/series/:id/letters',
    right('letters.sign'),
    handle({ params, body: signLetterRequest }, ({ params: { id }, body, actor, staff }) =>
      signLetter(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/letters/:id/release',
    right('letters.release'),
    handle({ params }, ({ params: { id }, actor, staff }) =>
      releaseLetter(context, actor, staff, id),
    ),
  );
  return router;
}

/**
 * GET /letters           the family's letters, and what is still awaited; after a fresh code
 * GET /letters/:id       open one; the clinic sees that it was opened
 * GET /letters/:id.pdf   for paper
 */
export function familyLettersRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/letters',
    familyReach('fresh'),
    handleFamily({}, ({ actor, visitor }) => listFamilyLetters(context, actor, visitor)),
  );
  router.get(
    '/letters/:id.pdf',
    familyReach('fresh'),
    handleFamily({ params }, async ({ params: { id }, actor, visitor, res }) =>
      sendPdf(res, await printLetterForFamily(context, actor, visitor, id)),
    ),
  );
  router.get(
    '/letters/:id',
    familyReach('fresh'),
    handleFamily({ params }, ({ params: { id }, actor, visitor }) =>
      openFamilyLetter(context, actor, visitor, id),
    ),
  );
  return router;
}
