import type { NextMorning, PathStep } from '../../../../shared/contracts/family-morning';

type Mouth = PathStep['mouths'][number]['mouth'];
export type PathChild = NextMorning['children'][number];

export interface Lane {
  childId: number;
  /** 1 to 4: place and colour of the child. */
  place: number;
  mouth: Mouth;
  /** The child's face stands here: the step is this child's. */
  face: PathChild['face'] | null;
  isLast: boolean;
}

export interface StepRow {
  kind: 'step';
  key: string;
  step: PathStep;
  lanes: Lane[];
  /** A clasp over all lanes: the step is everyone's. */
  isTied: boolean;
  isPast: boolean;
}

export interface NowRow {
  kind: 'now';
  key: string;
  lanes: Lane[];
}

export interface PathPart {
  part: PathStep['part'];
  says: string;
  lanes: Lane[];
  rows: (StepRow | NowRow)[];
}

/** What a lane looks like after a step that changed it. */
export function mouthAfter(mouth: Mouth): Mouth {
  if (mouth === 'ends') return 'empty';
  if (mouth === 'begins' || mouth === 'starts') return 'full';
  return mouth;
}

/** Places repeat after the fourth child; name and face still tell them apart. */
export const placeOf = (index: number): number => (index % 4) + 1;

const changes = (mouth: Mouth) => mouth === 'ends' || mouth === 'begins';

/** How many steps have come at `now` (epoch milliseconds); steps are in the order of their instants. */
export function stepsPast(steps: readonly PathStep[], now: number): number {
  return steps.filter((step) => Date.parse(step.time.at) <= now).length;
}

function lanesOfStep(step: PathStep, children: readonly PathChild[], isLast: boolean): Lane[] {
  const mouths = new Map(step.mouths.map(({ childId, mouth }) => [childId, mouth]));
  const isShared = isEveryones(step, children);
  return children.map((child, index) => {
    const mouth = mouths.get(child.childId) ?? 'none';
    const isMine = changes(mouth) || (!isShared && step.childIds.includes(child.childId));
    return {
      childId: child.childId,
      place: placeOf(index),
      // The heads above the path begin the lanes already.
      mouth: mouth === 'starts' ? 'full' : mouth,
      face: isMine ? child.face : null,
      isLast,
    };
  });
}

/** Everyone's step, where no lane changes: getting up, leaving, arriving. */
function isEveryones(step: PathStep, children: readonly PathChild[]): boolean {
  return (
    children.every((child) => step.childIds.includes(child.childId)) &&
    !step.mouths.some(({ mouth }) => changes(mouth))
  );
}

const carriedOn = (lanes: readonly Lane[]): Lane[] =>
  lanes.map((lane) => ({ ...lane, mouth: mouthAfter(lane.mouth), face: null, isLast: false }));

/**
 * The night path as rows to draw, one group a part of the night; 'now' stands before the first step that is still to
 * come, once any step has come.
 * @param now epoch milliseconds by the clinic's clock
 */
export function pathParts(
  morning: Pick<NextMorning, 'children' | 'steps' | 'parts'>,
  now: number,
): PathPart[] {
  const { children, steps } = morning;
  const past = stepsPast(steps, now);
  let before: Lane[] = children.map((child, index) => ({
    childId: child.childId,
    place: placeOf(index),
    mouth: 'full',
    face: null,
    isLast: false,
  }));
  const groups: PathPart[] = [];
  steps.forEach((step, index) => {
    let group = groups.at(-1);
    if (group?.part !== step.part) {
      const says = morning.parts.find((part) => part.part === step.part)?.says ?? '';
      group = { part: step.part, says, lanes: before, rows: [] };
      groups.push(group);
    }
    if (index === past && past > 0) group.rows.push({ kind: 'now', key: 'now', lanes: before });
    const lanes = lanesOfStep(step, children, index === steps.length - 1);
    group.rows.push({
      kind: 'step',
      key: step.key,
      step,
      lanes,
      isTied: isEveryones(step, children),
      isPast: index < past,
    });
    before = carriedOn(lanes);
  });
  return groups;
}

/** Whole hours and minutes from `now` to an instant; null when it has passed. */
export function timeLeft(at: string, now: number): { hours: number; minutes: number } | null {
  const left = Math.floor((Date.parse(at) - now) / 60_000);
  return left > 0 ? { hours: Math.floor(left / 60), minutes: left % 60 } : null;
}
