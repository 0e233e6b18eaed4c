import { Router } from 'express';
import * as z from 'zod';
import { idInPath } from '../../shared/contracts/common';
import {
  addRoomRequest,
  addSiteRequest,
  closeDaysRequest,
  holidayRequest,
  openDaysRequest,
  placesQuery,
  saveRoomRequest,
  saveSiteRequest,
  setUpQuery,
} from '../../shared/contracts/set-up';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { closeDays, openDays, setHoliday } from './change-closures';
import { addRoom, saveRoom } from './change-rooms';
import { addSite, saveSite } from './change-site';
import { placesOf, readSetUp } from './set-up';

const byId = z.object({ id: idInPath });

/**
 * Every change answers with the set-up of its site as it is then.
 *
 * GET  /set-up                 one site, by default the own one
 * GET  /set-up/places          regions and emergency number of a country
 * POST /set-up/sites           another site
 * PUT  /set-up/sites/:id
 * POST /set-up/rooms
 * PUT  /set-up/rooms/:id
 * POST /set-up/closures        the clinic closes on the days of a span
 * POST /set-up/closures/end    it opens on them again
 * PUT  /set-up/holidays        whether it works on a public holiday
 */
export function setUpRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/set-up',
    right('set-up.read'),
    handle({ query: setUpQuery }, ({ query, staff }) => readSetUp(context, staff, query.siteId)),
  );
  router.get(
    '/set-up/places',
    right('set-up.read'),
    handle({ query: placesQuery }, ({ query, staff }) =>
      Promise.resolve(placesOf(query.country, staff.language)),
    ),
  );
  router.post(
    '/set-up/sites',
    right('set-up.write'),
    handle({ body: addSiteRequest }, async ({ body, actor, staff }) =>
      readSetUp(context, staff, await addSite(context, actor, body)),
    ),
  );
  router.put(
    '/set-up/sites/:id',
    right('set-up.write'),
    handle({ params: byId, body: saveSiteRequest }, async ({ params, body, actor, staff }) => {
      await saveSite(context, actor, params.id, body);
      return readSetUp(context, staff, params.id);
    }),
  );
  router.post(
    '/set-up/rooms',
    right('set-up.write'),
    handle({ body: addRoomRequest }, async ({ body, actor, staff }) => {
      await addRoom(context, actor, body);
      return readSetUp(context, staff, body.siteId);
    }),
  );
  router.put(
    '/set-up/rooms/:id',
    right('set-up.write'),
    handle({ params: byId, body: saveRoomRequest }, async ({ params, body, actor, staff }) =>
      readSetUp(context, staff, await saveRoom(context, actor, params.id, body)),
    ),
  );
  router.post(
    '/set-up/closures',
    right('set-up.write'),
    handle({ body: closeDaysRequest }, async ({ body, actor, staff }) => {
      await closeDays(context, actor, body);
      return readSetUp(context, staff, body.siteId);
    }),
  );
  router.post(
    '/set-up/closures/end',
    right('set-up.write'),
    handle({ body: openDaysRequest }, async ({ body, actor, staff }) => {
      await openDays(context, actor, body);
      return readSetUp(context, staff, body.siteId);
    }),
  );
  router.put(
    '/set-up/holidays',
    right('set-up.write'),
    handle({ body: holidayRequest }, async ({ body, actor, staff }) => {
      await setHoliday(context, actor, body);
      return readSetUp(context, staff, body.siteId);
    }),
  );
  return router;
}
