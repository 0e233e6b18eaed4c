import { HttpClient, HttpErrorResponse } from '@angular/common/http';
import { Injectable, LOCALE_ID, inject } from '@angular/core';
import { firstValueFrom, timeout, type Observable } from 'rxjs';
import type { z } from 'zod';
import { problem, type ProblemDocument } from '../../../../shared/contracts/problem';

/** A connection that hangs must not hold a screen; moving the rehearsal's clock takes up to 25 seconds. */
const waitMs = 40_000;

/** A request that failed, in words a screen can show. `problem` is null when the server did not answer. */
export class ClinicFailure extends Error {
  constructor(
    readonly status: number,
    readonly problem: ProblemDocument | null,
  ) {
    super(problem?.title ?? $localize`:@@clinic.failure.unreached:The server does not answer.`);
  }

  get code(): string {
    return this.problem?.code ?? 'unreached';
  }

  /** Sentences by dotted path, for the fields of a form. */
  get fields(): ReadonlyMap<string, string> {
    return new Map((this.problem?.errors ?? []).map((error) => [error.path, error.message]));
  }
}

export function clinicFailure(error: unknown): ClinicFailure {
  if (error instanceof ClinicFailure) return error;
  if (error instanceof HttpErrorResponse) {
    const body = problem.safeParse(error.error);
    return new ClinicFailure(error.status, body.success ? body.data : null);
  }
  return new ClinicFailure(0, null);
}

/** The clinic's one way to the server: answers are parsed by their contract. Rejects with ClinicFailure only. */
@Injectable({ providedIn: 'root' })
export class ClinicHttp {
  private readonly http = inject(HttpClient);
  /** The server answers in the language of this screen, whatever the browser prefers. */
  private readonly options = { headers: { 'Accept-Language': inject(LOCALE_ID) } };

  get<Schema extends z.ZodType>(path: string, answer: Schema): Promise<z.output<Schema>> {
    return this.read(this.http.get(`/api/clinic${path}`, this.options), answer);
  }

  post<Schema extends z.ZodType>(
    path: string,
    body: object,
    answer: Schema,
  ): Promise<z.output<Schema>> {
    return this.read(this.http.post(`/api/clinic${path}`, body, this.options), answer);
  }

  put<Schema extends z.ZodType>(
    path: string,
    body: object,
    answer: Schema,
  ): Promise<z.output<Schema>> {
    return this.read(this.http.put(`/api/clinic${path}`, body, this.options), answer);
  }

  async delete(path: string): Promise<void> {
    try {
      await firstValueFrom(
        this.http.delete(`/api/clinic${path}`, this.options).pipe(timeout(waitMs)),
      );
    } catch (error) {
      throw clinicFailure(error);
    }
  }

  private async read<Schema extends z.ZodType>(
    request: Observable<unknown>,
    answer: Schema,
  ): Promise<z.output<Schema>> {
    try {
      return answer.parse(await firstValueFrom(request.pipe(timeout(waitMs))));
    } catch (error) {
      throw clinicFailure(error);
    }
  }
}
