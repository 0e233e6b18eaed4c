import { randomBytes } from 'node:crypto';
import type { ErrorRequestHandler, Request, RequestHandler, Response } from 'express';
import { sentenceIn } from '../wording/sentences';
import { Problem } from './problem';

/** Eight letters and digits that can be read out on the telephone: no 0, O, 1, I. */
function makeReference(): string {
  const letters = '23456789ABCDEFGHJKLMNPQRSTUVWXYZ';
  return Array.from(randomBytes(8), (byte) => letters[byte % letters.length]).join('');
}

interface HttpFailure {
  readonly status?: number;
  readonly type?: string;
  readonly name?: string;
  readonly code?: string;
}

const statusOfReader: Readonly<Record<string, () => Problem>> = {
  'entity.parse.failed': () => new Problem(400, 'bad-json', 'The request is not valid JSON.'),
  'entity.too.large': () => new Problem(413, 'too-large', 'The request is larger than 64 kB.'),
  'encoding.unsupported': () =>
    new Problem(415, 'unsupported-encoding', 'The request is written in an unknown encoding.'),
  'charset.unsupported': () =>
    new Problem(415, 'unsupported-encoding', 'The request is written in an unknown encoding.'),
};

/** What an error says to the outside; null when only a reference may leave the house. */
function problemOf(error: unknown): Problem | null {
  if (error instanceof Problem) return error;
  if (typeof error !== 'object' || error === null) return null;
  const failure = error as HttpFailure;
  const known = failure.type === undefined ? undefined : statusOfReader[failure.type];
  if (known) return known();
  if (failure.name === 'SequelizeConnectionAcquireTimeoutError')
    return new Problem(503, 'busy', 'Too much is going on at once. Try again in a moment.', {
      retryAfterSeconds: 5,
    });
  // body-parser and the router mark what the caller did wrong with a 4xx status.
  const isCallers = failure.status !== undefined && failure.status >= 400 && failure.status < 500;
  if (
    isCallers &&
    error instanceof Error &&
    (failure.type !== undefined || error instanceof URIError)
  )
    return new Problem(400, 'bad-request', 'The request cannot be read.');
  return null;
}

/** The same problem in the language of the clinic's screen; families read their own wording beside the code. */
function inLanguageOf(req: Request, problem: Problem): Problem {
  const { clinicLanguage } = req;
  if (clinicLanguage === undefined || clinicLanguage === 'en') return problem;
  const say = (sentence: string): string => sentenceIn(clinicLanguage, sentence);
  const { detail, errors, ...more } = problem.more;
  return new Problem(problem.status, problem.code, say(problem.title), {
    ...more,
    ...(detail === undefined ? {} : { detail: say(detail) }),
    ...(errors === undefined
      ? {}
      : { errors: errors.map(({ path, message }) => ({ path, message: say(message) })) }),
  });
}

function send(res: Response, problem: Problem): void {
  const { retryAfterSeconds, ...more } = problem.more;
  if (typeof retryAfterSeconds === 'number') res.set('Retry-After', String(retryAfterSeconds));
  res
    .status(problem.status)
    .set('Cache-Control', 'no-store')
    .type('application/problem+json')
    .send(
      JSON.stringify({
        type: 'about:blank',
        title: problem.title,
        status: problem.status,
        code: problem.code,
        ...more,
      }),
    );
}

/** The one error handler: RFC 9457. An unknown error leaves a reference only; the log keeps the rest under it. */
export const answerProblem: ErrorRequestHandler = (error, req, res, next) => {
  if (res.headersSent) {
    next(error);
    return;
  }
  const problem = problemOf(error);
  if (problem) {
    if (problem.status === 401 || problem.status === 403)
      req.log.warn({ code: problem.code }, 'refused');
    send(res, inLanguageOf(req, problem));
    return;
  }
  const reference = makeReference();
  req.log.error({ err: error as Error, reference }, 'unexpected failure');
  const unexpected = new Problem(
    500,
    'unexpected',
    'Something went wrong here. Tell us the reference if you call.',
    { reference },
  );
  send(res, inLanguageOf(req, unexpected));
};

export const noSuchRoute: RequestHandler = () => {
  throw new Problem(404, 'not-found', 'There is nothing at this address.');
};
