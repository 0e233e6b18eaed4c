import { Router } from 'express';
import { z } from 'zod';
import { day, idInPath } from '../../shared/contracts/common';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { readAccessRecord } from './access-record';

const filter = z.object({
  childId: idInPath.optional(),
  staffId: idInPath.optional(),
  from: day.optional(),
});

/** GET /access-record   who saw and changed what: the newest 200 rows, by child, staff member and first day */
export function accessRecordRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/access-record',
    right('access-record.read'),
    handle({ query: filter }, ({ query, actor }) => readAccessRecord(context, actor, query)),
  );
  return router;
}
