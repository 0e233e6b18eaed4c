import type { Request, RequestHandler, Response } from 'express';
import type { z } from 'zod';
import type { Actor } from '../access-record/record';
import { familyVisitorOf, staffMemberOf } from '../auth/current-user';
import type { FamilyVisitor, StaffMember } from '../auth/current-user';
import { invalid } from './problem';

type Schema = z.ZodType | undefined;
type Parsed<S extends Schema> = S extends z.ZodType ? z.output<S> : undefined;

export interface Shape<Params extends Schema, Query extends Schema, Body extends Schema> {
  readonly params?: Params;
  readonly query?: Query;
  readonly body?: Body;
}

interface Input<Params extends Schema, Query extends Schema, Body extends Schema> {
  readonly params: Parsed<Params>;
  readonly query: Parsed<Query>;
  readonly body: Parsed<Body>;
  readonly req: Request;
  readonly res: Response;
}

export interface ClinicInput<
  Params extends Schema,
  Query extends Schema,
  Body extends Schema,
> extends Input<Params, Query, Body> {
  readonly staff: StaffMember;
  readonly actor: Actor;
}

export interface FamilyInput<
  Params extends Schema,
  Query extends Schema,
  Body extends Schema,
> extends Input<Params, Query, Body> {
  readonly visitor: FamilyVisitor;
  readonly actor: Actor;
}

function parse<S extends Schema>(schema: S, value: unknown): Parsed<S> {
  if (schema === undefined) return undefined as Parsed<S>;
  const parsed = schema.safeParse(value ?? {});
  if (parsed.success) return parsed.data as Parsed<S>;
  throw invalid(
    parsed.error.issues.map((issue) => ({
      path: issue.path.map(String).join('.'),
      message: issue.message,
    })),
  );
}

function inputOf<Params extends Schema, Query extends Schema, Body extends Schema>(
  shape: Shape<Params, Query, Body>,
  req: Request,
  res: Response,
): Input<Params, Query, Body> {
  return {
    params: parse(shape.params as Params, req.params),
    query: parse(shape.query as Query, req.query),
    body: parse(shape.body as Body, req.body),
    req,
    res,
  };
}

function answerWith(res: Response, answer: unknown): void {
  if (res.headersSent) return;
  res.set('Cache-Control', 'no-store');
  if (answer === undefined) res.status(204).end();
  else res.json(answer);
}

/** A last step carries its schemas, so that the description of the interface is made from what the server checks. */
export type DescribedHandler = RequestHandler & {
  readonly shape: Shape<Schema, Schema, Schema>;
};

/** Last step of a clinic ladder: reads the input by its schemas (422 with fields when wrong) and answers as JSON. */
export function handle<
  Params extends Schema = undefined,
  Query extends Schema = undefined,
  Body extends Schema = undefined,
>(
  shape: Shape<Params, Query, Body>,
  handler: (input: ClinicInput<Params, Query, Body>) => Promise<unknown>,
): DescribedHandler {
  const step: RequestHandler = async (req, res) => {
    const { staff, actor } = staffMemberOf(req);
    answerWith(res, await handler({ ...inputOf(shape, req, res), staff, actor }));
  };
  return Object.assign(step, { shape });
}

/** Last step of a family ladder, for a signed-in family member. */
export function handleFamily<
  Params extends Schema = undefined,
  Query extends Schema = undefined,
  Body extends Schema = undefined,
>(
  shape: Shape<Params, Query, Body>,
  handler: (input: FamilyInput<Params, Query, Body>) => Promise<unknown>,
): DescribedHandler {
  const step: RequestHandler = async (req, res) => {
    const { visitor, actor } = familyVisitorOf(req);
    answerWith(res, await handler({ ...inputOf(shape, req, res), visitor, actor }));
  };
  return Object.assign(step, { shape });
}

/** Last step where nobody is signed in yet. */
export function handleOpen<
  Params extends Schema = undefined,
  Query extends Schema = undefined,
  Body extends Schema = undefined,
>(
  shape: Shape<Params, Query, Body>,
  handler: (input: Input<Params, Query, Body>) => Promise<unknown>,
): DescribedHandler {
  const step: RequestHandler = async (req, res) => {
    answerWith(res, await handler(inputOf(shape, req, res)));
  };
  return Object.assign(step, { shape });
}
