import { HttpErrorResponse, type HttpInterceptorFn } from '@angular/common/http';
import { inject } from '@angular/core';
import { Router } from '@angular/router';
import { catchError, throwError } from 'rxjs';
import { ClinicUser } from './clinic-user';

/** A session that has ended leads back to sign-in, and from there to the same screen. */
export const signedOutInterceptor: HttpInterceptorFn = (request, next) => {
  const router = inject(Router);
  const user = inject(ClinicUser);
  return next(request).pipe(
    catchError((error: unknown) => {
      if (
        error instanceof HttpErrorResponse &&
        error.status === 401 &&
        !request.url.endsWith('/session')
      ) {
        user.forget();
        void router.navigate(['/sign-in'], { queryParams: { back: router.url } });
      }
      return throwError(() => error);
    }),
  );
};
