import { Router } from 'express';
import { z } from 'zod';
import { day } from '../../shared/contracts/common';
import { fastingCheckRequest, morningChangeRequest } from '../../shared/contracts/family-morning';
import { familyVisitorOf } from '../auth/current-user';
import { familyReach } from '../auth/family-reach';
import type { Context } from '../context';
import { handleFamily } from '../http/handle';
import { familyCalendarFile, familyCalendarOf } from './family-calendar';
import { recordMorningChange } from './morning-changes';
import { morningQuestionOf } from './morning-question';
import { nextMorningOf } from './next-morning';
import { recordFastingCheck } from './record-check';

/**
 * GET  /next-morning          the household's next morning as one path through the night
 * GET  /morning-question?on=  the question of that morning, the next one when no day is named
 * POST /fasting-checks        the answer for every child, and what to do now
 * POST /morning-changes       late, ill, not coming
 * GET  /calendar              the mornings of the household
 * GET  /calendar.ics          the same as a calendar file
 */
export function fastingRoutes(context: Context): Router {
  const router = Router();
  const household = familyReach('household');
  router.get(
    '/next-morning',
    household,
    handleFamily({}, ({ actor, visitor }) => nextMorningOf(context, actor, visitor)),
  );
  router.get(
    '/morning-question',
    household,
    handleFamily({ query: z.object({ on: day.optional() }) }, ({ query, actor, visitor }) =>
      morningQuestionOf(context, actor, visitor, query.on),
    ),
  );
  router.post(
    '/fasting-checks',
    household,
    handleFamily({ body: fastingCheckRequest }, async ({ body, actor, visitor }) => {
      const { outcome } = await recordFastingCheck(context, actor, {
        ...body,
        ...whoFrom(visitor),
        answers: body.answers.map((answer) => ({
          ...answer,
          lastIntakeAt: answer.lastIntakeAt === null ? null : Date.parse(answer.lastIntakeAt),
        })),
        deviceAt: Date.parse(body.deviceAt),
      });
      return outcome;
    }),
  );
  router.post(
    '/morning-changes',
    household,
    handleFamily({ body: morningChangeRequest }, ({ body, actor, visitor }) =>
      recordMorningChange(context, actor, {
        ...body,
        ...whoFrom(visitor),
        deviceAt: Date.parse(body.deviceAt),
      }),
    ),
  );
  router.get(
    '/calendar',
    household,
    handleFamily({}, ({ actor, visitor }) => familyCalendarOf(context, actor, visitor)),
  );
  router.get('/calendar.ics', household, async (req, res) => {
    const { actor, visitor } = familyVisitorOf(req);
    const file = await familyCalendarFile(context, actor, visitor);
    res
      .set({
        'Cache-Control': 'no-store',
        'Content-Disposition': 'attachment; filename="visits.ics"',
      })
      .type('text/calendar; charset=utf-8')
      .send(file);
  });
  return router;
}

const whoFrom = ({
  householdId,
  familyMemberId,
  language,
}: {
  householdId: number;
  familyMemberId: number;
  language: string;
}) => ({ householdId, familyMemberId, language, source: 'web' as const });
