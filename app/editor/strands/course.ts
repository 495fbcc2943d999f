/** A point of a course, with its normal (to the left of the way, of length 1). */
export interface CoursePoint {
  readonly x: number;
  readonly y: number;
  readonly nx: number;
  readonly ny: number;
}

/**
 * The middle of a cord by its arc length s: in from the right along the upper end, round into its lane, down, and out
 * again along the lower end. Within the lane s is y, so that a twist stays where it is while the ends of the cord move.
 */
export interface Course {
  readonly from: number;
  readonly to: number;
  at(s: number): CoursePoint;
  /** Where straight and bent parts meet. */
  readonly joints: readonly number[];
}

/** Radius of the bends [px], where there is room. */
const RADIUS = 12;

/** An end of a course: at the edge, or straight on past what is drawn. */
export interface CourseEnd {
  readonly y: number;
  readonly bends: boolean;
}

/**
 * @param lane x of the lane
 * @param edge x where bent ends begin and end, right of the lane
 * @param upper end with the smaller y
 */
export function courseOf(lane: number, edge: number, upper: CourseEnd, lower: CourseEnd): Course {
  const bends = Number(upper.bends) + Number(lower.bends);
  const room = bends === 0 ? RADIUS : Math.max(0, (lower.y - upper.y) / bends);
  const radius = Math.max(0.01, Math.min(RADIUS, edge - lane, room));
  const arc = (Math.PI / 2) * radius;
  const arm = edge - lane - radius;
  const start = upper.bends ? upper.y + radius : upper.y;
  const end = lower.bends ? lower.y - radius : lower.y;
  const from = upper.bends ? start - arc - arm : start;
  const to = lower.bends ? end + arc + arm : end;
  const at = (s: number): CoursePoint => {
    if (s < start) {
      if (s < start - arc) return { x: lane + radius + (start - arc - s), y: upper.y, nx: 0, ny: 1 };
      const turn = (start - s) / radius;
      const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
      return { x: lane + radius - radius * cos, y: start - radius * sin, nx: cos, ny: sin };
    }
    if (s > end) {
      if (s > end + arc) return { x: lane + radius + (s - end - arc), y: lower.y, nx: 0, ny: -1 };
      const turn = (s - end) / radius;
      const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
      return { x: lane + radius - radius * cos, y: end + radius * sin, nx: cos, ny: -sin };
    }
    return { x: lane, y: s, nx: 1, ny: 0 };
  };
  const joints = [...(upper.bends ? [start - arc, start] : []), ...(lower.bends ? [end, end + arc] : [])];
  return { from, to, at, joints };
}

/** Straight from a lane to the edge: how a tie between the ends of a cord leaves it. */
export function armOf(lane: number, edge: number, y: number): Course {
  return { from: 0, to: edge - lane, at: (s) => ({ x: lane + s, y, nx: 0, ny: -1 }), joints: [] };
}

/** Path of a line that keeps a distance from a course, between two of its lengths. */
export function pathAlong(course: Course, offset: (s: number) => number, knots: readonly number[]): string {
  let path = "";
  for (let k = 0; k + 1 < knots.length; k += 1) {
    const [a, b] = [knots[k] ?? 0, knots[k + 1] ?? 0];
    const [start, end] = [pointAt(course, offset, a), pointAt(course, offset, b)];
    if (k === 0) path += `M${px(start.x)} ${px(start.y)}`;
    // The cubic with the right points and directions at both ends.
    const third = (b - a) / 3;
    const [leaving, arriving] = [slopeAt(course, offset, a, b), slopeAt(course, offset, b, a)];
    path += `C${px(start.x + leaving.x * third)} ${px(start.y + leaving.y * third)} ${px(end.x - arriving.x * third)} ${px(end.y - arriving.y * third)} ${px(end.x)} ${px(end.y)}`;
  }
  return path;
}

/** All joints of a course within a stretch, with its two ends. */
export function knotsWithin(course: Course, from: number, to: number, more: readonly number[] = []): number[] {
  const inner = [...course.joints, ...more].filter((s) => s > from + 0.01 && s < to - 0.01);
  return [from, ...inner.sort((a, b) => a - b), to];
}

function pointAt(course: Course, offset: (s: number) => number, s: number): { x: number; y: number } {
  const { x, y, nx, ny } = course.at(s);
  const by = offset(s);
  return { x: x + nx * by, y: y + ny * by };
}

/** Derivative by s at `s`, from the side of `toward`. */
function slopeAt(course: Course, offset: (s: number) => number, s: number, toward: number) {
  const step = (toward > s ? 1 : -1) * Math.min(0.01, Math.abs(toward - s) / 4);
  const [a, b] = [pointAt(course, offset, s), pointAt(course, offset, s + step)];
  return step === 0 ? { x: 0, y: 0 } : { x: (b.x - a.x) / step, y: (b.y - a.y) / step };
}

/** A length as written in a path: to a tenth of a pixel. */
export function px(length: number): string {
  return String(Math.round(length * 10) / 10);
}
