import { isDevMode } from '@angular/core';

const WORKER = 'ngsw-worker.js';
/** Time for the first page to have the line for itself. */
const AFTER_MS = 4_000;

interface TrustedTypesFactory {
  createPolicy(
    name: string,
    rules: { createScriptURL(address: string): string },
  ): { createScriptURL(address: string): unknown };
}

/**
 * The address of the service worker in the form that a page under Trusted Types accepts: a policy of its own that
 * lets this one address through. Relative, so that each language registers its own worker.
 */
export function workerAddress(): string {
  const factory = (globalThis as { trustedTypes?: TrustedTypesFactory }).trustedTypes;
  if (!factory) return WORKER;
  const policy = factory.createPolicy('app#sw', {
    createScriptURL: (address) => {
      if (address !== WORKER) throw new Error('Only the application’s own worker is registered.');
      return address;
    },
  });
  return policy.createScriptURL(WORKER) as string;
}

/**
 * Registers the worker that keeps the application on the phone. By hand: the page needs nothing else of Angular's
 * service worker module, which would come with every page.
 */
export function registerWorker(): void {
  if (isDevMode() || !('serviceWorker' in navigator)) return;
  setTimeout(() => {
    navigator.serviceWorker.register(workerAddress()).catch(() => {
      // Private windows refuse workers; the page then works with signal only.
    });
  }, AFTER_MS);
}
