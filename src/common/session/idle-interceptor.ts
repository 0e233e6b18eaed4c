import type { HttpInterceptorFn } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';

const freshMs = 60_000;

/** When somebody last touched this window; what a list fetches by itself does not count as being here. */
@Injectable({ providedIn: 'root' })
export class LastTouch {
  private at = Date.now();

  constructor() {
    const note = (): void => {
      this.at = Date.now();
    };
    for (const kind of ['pointerdown', 'keydown'])
      document.addEventListener(kind, note, { capture: true, passive: true });
  }

  isRecent(): boolean {
    return Date.now() - this.at < freshMs;
  }
}

/** An open list that nobody looks at does not keep the session alive. */
export const idleInterceptor: HttpInterceptorFn = (request, next) =>
  inject(LastTouch).isRecent()
    ? next(request)
    : next(request.clone({ setHeaders: { 'Threedawn-Background': '1' } }));
