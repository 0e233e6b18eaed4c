import * as z from 'zod';
import { day, id, instant } from './common';

export const sayBackQuestionName = z.enum(['water', 'comfort', 'last', 'mistake']);

/** One question as ready words; a choice is sent back by its name. */
export const sayBackQuestion = z.object({
  question: sayBackQuestionName,
  /** How often it was answered before: 1 when it is asked again after an explanation. */
  tries: z.number().int().min(0),
  childId: id,
  face: z.enum(['baby', 'toddler', 'child']),
  asks: z.string(),
  choices: z.array(z.object({ choice: z.string(), picture: z.string(), says: z.string() })),
});
export type SayBackQuestionAsked = z.infer<typeof sayBackQuestion>;

export const sayItBack = z.object({
  now: instant,
  /** 'none': nothing to ask; no morning is planned, or the words are not signed in this language. */
  state: z.enum(['open', 'done', 'none']),
  on: day.nullable(),
  heading: z.string(),
  says: z.string(),
  /** In the order of asking. */
  questions: z.array(sayBackQuestion),
  /** How many are asked in all, those already answered too. */
  total: z.number().int(),
});
export type SayItBack = z.infer<typeof sayItBack>;

export const sayBackAnswerRequest = z.object({
  submissionKey: z.uuid(),
  on: day,
  question: sayBackQuestionName,
  /** As the question came. */
  tries: z.number().int().min(0).max(5),
  choice: z.string().min(1).max(20),
  deviceAt: instant,
});
export type SayBackAnswerRequest = z.input<typeof sayBackAnswerRequest>;

/** What the family reads after an answer, and what comes then. */
export const sayBackAnswered = z.object({
  isRight: z.boolean(),
  heading: z.string(),
  says: z.string(),
  picture: z.string(),
  next: sayItBack,
});
export type SayBackAnswered = z.infer<typeof sayBackAnswered>;
