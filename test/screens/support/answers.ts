import type { BrowserContext, Route } from '@playwright/test';

type Json = Record<string, unknown>;

/** Changes what the house answers to requests whose address fits. */
export function altered(
  context: BrowserContext,
  address: string,
  change: (body: Json) => Json,
): Promise<unknown> {
  return context.route(address, async (route: Route) => {
    try {
      const response = await route.fetch();
      await route.fulfill({ response, json: change((await response.json()) as Json) });
    } catch {
      // The page that asked has gone on to another address.
    }
  });
}

/** Lists that are empty, as in a clinic on its first day. */
export const emptied = (body: Json): Json =>
  Object.fromEntries(
    Object.entries(body).map(([name, value]) => [name, Array.isArray(value) ? [] : value]),
  );

/** The house answers with a fault of its own. */
export function broken(context: BrowserContext, address: string): Promise<unknown> {
  return context.route(address, (route) =>
    route.fulfill({
      status: 500,
      contentType: 'application/problem+json',
      json: {
        type: 'about:blank',
        title: 'Something failed on our side.',
        status: 500,
        code: 'unexpected',
        reference: '4KX-207',
      },
    }),
  );
}

/** No signal. */
export const unreached = (context: BrowserContext, address: string): Promise<unknown> =>
  context.route(address, (route) => route.abort('internetdisconnected'));

/** An answer that does not come. */
export const silent = (context: BrowserContext, address: string): Promise<unknown> =>
  context.route(address, () => new Promise(() => undefined));
