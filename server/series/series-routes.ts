import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import {
  closeSeriesRequest,
  loseMorningRequest,
  planSeriesRequest,
  proposeSeriesRequest,
} from '../../shared/contracts/series';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import {
  pauseMorningRequest,
  replanPreviewRequest,
  replanProposalRequest,
  replanRequest,
} from '../../shared/contracts/replan';
import { closeSeries, loseMorning } from './lose-morning';
import { pauseMorning } from './pause-morning';
import { planSeries } from './plan-series';
import { previewSeries, proposeSeries } from './proposals';
import { previewReplan, replanSeries } from './replan';
import { proposeReplan } from './replan-proposals';

const morningInPath = z.object({ morningId: idInPath });
const seriesInPath = z.object({ seriesId: idInPath });
const previewRequest = planSeriesRequest.pick({ orderIds: true, days: true, nights: true });

/**
 * POST /series/proposals
 * POST /series/previews
 * POST /series
 * POST /series/replan-proposals
 * POST /series/replan-previews
 * POST /series/replans
 * POST /mornings/:morningId/loss
 * POST /mornings/:morningId/pause
 * POST /series/:seriesId/closure
 */
export function seriesRoutes(context: Context): Router {
  const router = Router();
  router.post(
    '/series/proposals',
    right('series.plan'),
    handle({ body: proposeSeriesRequest }, ({ body, actor, staff }) =>
      proposeSeries(context, actor, staff, body),
    ),
  );
  router.post(
    '/series/previews',
    right('series.plan'),
    handle({ body: previewRequest }, ({ body, actor, staff }) =>
      previewSeries(context, actor, staff, body),
    ),
  );
  router.post(
    '/series',
    right('series.plan'),
    handle({ body: planSeriesRequest }, ({ body, actor, staff }) =>
      planSeries(context, actor, staff, body),
    ),
  );
  router.post(
    '/series/replan-proposals',
    right('series.plan'),
    handle({ body: replanProposalRequest }, ({ body, actor, staff }) =>
      proposeReplan(context, actor, staff, body),
    ),
  );
  router.post(
    '/series/replan-previews',
    right('series.plan'),
    handle({ body: replanPreviewRequest }, ({ body, actor, staff }) =>
      previewReplan(context, actor, staff, body),
    ),
  );
  router.post(
    '/series/replans',
    right('series.plan'),
    handle({ body: replanRequest }, ({ body, actor, staff }) =>
      replanSeries(context, actor, staff, body),
    ),
  );
  router.post(
    '/mornings/:morningId/loss',
    right('series.plan'),
    handle(
      { params: morningInPath, body: loseMorningRequest },
      async ({ params, body, actor, staff }) => {
        await loseMorning(context, actor, staff, params.morningId, body.reason);
        return { done: true };
      },
    ),
  );
  router.post(
    '/mornings/:morningId/pause',
    right('series.plan'),
    handle({ params: morningInPath, body: pauseMorningRequest }, ({ params, body, actor, staff }) =>
      pauseMorning(context, actor, staff, params.morningId, body.reason),
    ),
  );
  router.post(
    '/series/:seriesId/closure',
    right('series.close'),
    handle(
      { params: seriesInPath, body: closeSeriesRequest },
      async ({ params, body, actor, staff }) => {
        await closeSeries(context, actor, staff, params.seriesId, body.reason);
        return { done: true };
      },
    ),
  );
  return router;
}
