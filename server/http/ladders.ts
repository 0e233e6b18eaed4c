import type { Router } from 'express';
import type { Right } from '../../shared/access/rights';
import type { DescribedHandler } from './handle';

export interface MountedRouter {
  readonly under: string;
  readonly router: Router;
}

/** A route as its ladder declares it. */
export interface MountedRoute {
  readonly method: string;
  /** With parameters as Express writes them: '/api/clinic/children/:childId'. */
  readonly path: string;
  readonly right: Right | undefined;
  readonly reach: 'household' | 'fresh' | undefined;
  readonly shape: DescribedHandler['shape'] | undefined;
}

/** What a step of a ladder may carry: the right it demands, the reach it demands, the schemas it checks. */
type Step = Partial<Pick<MountedRoute, 'right' | 'reach' | 'shape'>>;

interface Layer {
  readonly route?: {
    readonly path: string;
    readonly stack: readonly { readonly method: string; readonly handle: Step }[];
  };
}

/** Every route of the routers, in the order in which they were added. */
export function mountedRoutes(routers: readonly MountedRouter[]): MountedRoute[] {
  return routers.flatMap(({ under, router }) =>
    (router.stack as unknown as readonly Layer[]).flatMap(({ route }) => {
      if (!route) return [];
      const steps = route.stack.map(({ handle }) => handle);
      return [...new Set(route.stack.map(({ method }) => method))].map((method) => ({
        method,
        path: `${under}${route.path}`,
        right: steps.find((step) => step.right)?.right,
        reach: steps.find((step) => step.reach)?.reach,
        shape: steps.find((step) => step.shape)?.shape,
      }));
    }),
  );
}
