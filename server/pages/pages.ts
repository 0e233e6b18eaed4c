import { Router } from 'express';
import { clinicLanguages } from '../../shared/languages/clinic-languages';
import { isLanguageId } from '../../shared/languages/languages';
import { linkOf } from '../auth/links';
import type { Context } from '../context';
import { limit } from '../http/limit';
import { builtApplications } from './built-applications';
import { languageChoice } from './language-choice';
import { sheetPage } from './sheet-page';
import { staticApplication } from './static-application';
import { notThere } from './small-page';

const hour = 3600;

/**
 * GET /                  choose a language
 * GET /i/:token          a one-use invitation: on to the page in the member's language, using nothing up
 * GET /m/:token          tonight's household link, likewise
 * GET /sheet/:language   the public fasting sheet
 * GET /clinic            on to the clinic's application
 * GET /{language}/...    the family's application; /clinic/{language}/... the clinic's
 */
export function pages(context: Context): Router {
  const router = Router({ strict: false });
  const { distDir } = context.settings;
  const ofFamily = builtApplications(distDir, 'family');
  const ofClinic = builtApplications(distDir, 'clinic');

  router.get('/', (_req, res) => {
    res.set('Cache-Control', 'no-cache').type('html').send(languageChoice(ofFamily()));
  });
  for (const kind of ['i', 'm'] as const)
    router.get(
      `/${kind}/:token`,
      limit({ name: 'link-page', hits: 120, seconds: 60 }),
      async (req, res) => {
        const token = String(req.params['token']);
        const link = /^[A-Za-z0-9_-]{16,64}$/.test(token) ? await linkOf(context.db, token) : null;
        const language = link && ofFamily().includes(link.language) ? link.language : 'en';
        res
          .set('Cache-Control', 'no-store')
          .redirect(302, `/${language}/${kind}/${encodeURIComponent(token)}`);
      },
    );
  router.get('/sheet/:language', async (req, res, next) => {
    const language = String(req.params['language']);
    const page = isLanguageId(language) ? await sheetPage(context, language) : null;
    if (page === null) next();
    else res.set('Cache-Control', `public, max-age=${hour}`).type('html').send(page);
  });
  router.get('/clinic', (req, res, next) => {
    const isWithoutLanguage = /^\/clinic\/?$/.test(req.path);
    const wanted = req.acceptsLanguages(...clinicLanguages.filter((id) => ofClinic().includes(id)));
    if (isWithoutLanguage)
      res.vary('Accept-Language').redirect(302, `/clinic/${wanted || clinicLanguages[0]}/`);
    else next();
  });
  router.use('/clinic/:language', (req, res, next) => {
    const language = String(req.params['language']);
    // Handed back, so that the router hears of a failure.
    return ofClinic().includes(language)
      ? staticApplication(distDir, 'clinic', language)(req, res, next)
      : next();
  });
  router.use('/:language', (req, res, next) => {
    const language = String(req.params['language']);
    return ofFamily().includes(language)
      ? staticApplication(distDir, 'family', language)(req, res, next)
      : next();
  });
  router.use((req, res, next) => {
    if (req.method === 'GET' || req.method === 'HEAD')
      res.status(404).type('html').send(notThere());
    else next();
  });
  return router;
}
