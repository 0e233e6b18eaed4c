import express from 'express';
import type { Express, RequestHandler, Router } from 'express';
import { clinicSessionRoutes } from './auth/clinic-session-routes';
import { knowFamily } from './auth/family-visitors';
import { familySessionRoutes } from './auth/family-session-routes';
import { clinicSessions, familySessions } from './auth/sessions';
import { knowClinicLanguage, knowStaff, staffAuthenticator } from './auth/staff-sign-in';
import { accessRecordRoutes } from './access-record/access-record-routes';
import { alertRoutes } from './alerts/alert-routes';
import { callRoutes } from './calls/call-routes';
import { childrenRoutes } from './children/children-routes';
import { closingRoutes } from './closing/closing-routes';
import { collectionsRoutes } from './collections/collections-routes';
import { individualPlansRoutes } from './individual-plans/individual-plans-routes';
import { consentRoutes } from './messages/consent-routes';
import { familyFeedRoutes, feedRoutes } from './messages/feed-routes';
import { messageRoutes } from './messages/message-routes';
import { ordersRoutes } from './orders/orders-routes';
import { seriesRoutes } from './series/series-routes';
import { setOutRoutes } from './set-out/set-out-routes';
import { setUpRoutes } from './sites/set-up-routes';
import type { Context } from './context';
import { fastingRoutes } from './fasting/fasting-routes';
import { answerProblem, noSuchRoute } from './http/answer-problem';
import { keepContext } from './http/context-of';
import { securityHeaders } from './http/headers';
import { openApiRoutes } from './http/openapi-routes';
import { requestLog } from './http/request-log';
import { sameOrigin } from './http/same-origin';
import { familyLettersRoutes, lettersRoutes } from './letters/letters-routes';
import { liveRoutes } from './live/live-routes';
import { pages } from './pages/pages';
import { peopleRoutes } from './people/people-routes';
import { profileRoutes } from './protocols/profiles-routes';
import { protocolRoutes } from './protocols/protocols-routes';
import { resultsRoutes } from './results/results-routes';
import { sayItBackRoutes } from './say-it-back/say-it-back-routes';
import { specimensRoutes } from './specimens/specimens-routes';
import { rehearsalRoutes } from './stand-ins/rehearsal-routes';
import { smsHooks } from './webhooks/sms-hooks';
import { wordingRoutes } from './wording/wording-routes';

export interface Mount {
  readonly under: '/api/clinic' | '/api/family' | '/hooks' | '/feeds';
  readonly routes: (context: Context) => Router;
}

/** Every route of the application: a new matter adds its line here. */
export const mounts: readonly Mount[] = [
  { under: '/api/clinic', routes: clinicSessionRoutes },
  { under: '/api/clinic', routes: peopleRoutes },
  { under: '/api/clinic', routes: accessRecordRoutes },
  { under: '/api/clinic', routes: setUpRoutes },
  { under: '/api/clinic', routes: protocolRoutes },
  { under: '/api/clinic', routes: profileRoutes },
  { under: '/api/clinic', routes: childrenRoutes },
  { under: '/api/clinic', routes: ordersRoutes },
  { under: '/api/clinic', routes: individualPlansRoutes },
  { under: '/api/clinic', routes: seriesRoutes },
  { under: '/api/clinic', routes: setOutRoutes },
  { under: '/api/clinic', routes: collectionsRoutes },
  { under: '/api/clinic', routes: closingRoutes },
  { under: '/api/clinic', routes: callRoutes },
  { under: '/api/clinic', routes: alertRoutes },
  { under: '/api/clinic', routes: specimensRoutes },
  { under: '/api/clinic', routes: resultsRoutes },
  { under: '/api/clinic', routes: lettersRoutes },
  { under: '/api/clinic', routes: messageRoutes },
  { under: '/api/clinic', routes: consentRoutes },
  { under: '/api/clinic', routes: wordingRoutes },
  { under: '/api/clinic', routes: liveRoutes },
  { under: '/api/clinic', routes: rehearsalRoutes },
  { under: '/api/family', routes: familySessionRoutes },
  { under: '/api/family', routes: fastingRoutes },
  { under: '/api/family', routes: sayItBackRoutes },
  { under: '/api/family', routes: familyLettersRoutes },
  { under: '/api/family', routes: familyFeedRoutes },
  { under: '/hooks', routes: smsHooks },
  { under: '/feeds', routes: feedRoutes },
];

/**
 * Builds the web application. Order matters: headers, log, the same-origin guard before anything reads a body, sessions
 * of each side under its own path, the routes, the pages, and one handler for everything that failed.
 */
export function buildApp(context: Context): Express {
  const { settings, log } = context;
  const app = express();
  const passport = staffAuthenticator(context);
  keepContext(app, context);
  app.disable('x-powered-by');
  app.set('trust proxy', settings.trustedProxies);

  app.use(securityHeaders({ isProduction: settings.mode === 'production' }));
  app.use(requestLog(log));
  app.use('/api/clinic', knowClinicLanguage);
  app.use('/api', sameOrigin(settings.origin), express.json({ limit: '64kb' }));
  app.use('/api/clinic', clinicSessions(context), passport.session() as RequestHandler, knowStaff);
  app.use('/api/family', familySessions(context), knowFamily(context));
  const mounted = mounts.map(({ under, routes }) => ({ under, router: routes(context) }));
  for (const { under, router } of mounted) app.use(under, router);
  app.use('/api/clinic', openApiRoutes(mounted));
  app.use(['/api', '/hooks', '/feeds'], noSuchRoute);
  app.use(pages(context));
  app.use(answerProblem);
  return app;
}
