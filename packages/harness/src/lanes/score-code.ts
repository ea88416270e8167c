import { type FunctionCode, LaneCode, type Operand, PAIR_BYTES, type Pointer } from "@perigauge/steppers";
import { ALONG_TRACK_PHASE_LIMIT } from "../score/displacement-errors.ts";
import { ESCAPE_DISTANCE } from "../score/run-end.ts";
import type { StepMeasure } from "../score/score.ts";
import { writeAngle, writeNearestTurn } from "./angle-code.ts";
import {
  EVENTS_AT,
  EXACT_AT,
  maximumAtRows,
  maximumRows,
  STATE_BYTES,
  STREAM_AT,
  scoreRows,
} from "./memory-map.ts";

/** What a scoring kernel is made for. */
export interface ScoreSetting {
  readonly measures: ReadonlySet<StepMeasure>;
  readonly passages: boolean;
  /** Of a circular orbit: passages are returns of the polar angle. */
  readonly circular: boolean;
  /** Bytes of the stream per step. */
  readonly streamBytes: number;
}

const ROW = STATE_BYTES / 4;

/** What of a step several measures need; each is written where it is first used and shared from then on. */
interface StepValues {
  readonly code: LaneCode;
  readonly lane: Pointer;
  readonly x: Operand;
  readonly y: Operand;
  readonly vx: Operand;
  readonly vy: Operand;
  readonly xe: Operand;
  readonly ye: Operand;
  readonly vxe: Operand;
  readonly vye: Operand;
  readonly r2: Operand;
  readonly v2: Operand;
  readonly rising: Operand;
}

/**
 * The function `score(count, width)`: the measures of `RunScorer` at rows 1 .. count of the stream, operation for operation, and their
 * running maxima; the ends of `findEnd`; and the steps in which a lane passed periapsis, a bit per lane in the word of the step. Returns
 * all those words joined by "or".
 */
export function scoreCode(setting: ScoreSetting): FunctionCode {
  const code = new LaneCode(2, 10);
  const [count, width] = [code.parameter(0), code.parameter(1)];
  const [lane, stream, exact] = [code.pointer(), code.pointer(), code.pointer()];
  const [streamRow, exactRow, events] = [code.pointer(), code.pointer(), code.pointer()];
  const [passed, passedAny] = [code.pointer(), code.pointer()];
  const nodes = [code.pointer(), code.pointer()] as const;
  code.set(streamRow, STREAM_AT + setting.streamBytes);
  code.set(exactRow, EXACT_AT + STATE_BYTES);
  code.set(events, EVENTS_AT);
  code.set(passedAny, 0);
  code.countDown(count, () => {
    code.set(lane, 0);
    code.set(stream, streamRow);
    code.set(exact, exactRow);
    code.set(passed, 0);
    code.repeat(lane, width, () => {
      const mask = writeScores(code, setting, lane, stream, exact, nodes);
      if (mask !== null) code.joinBits(passed, mask, lane);
      for (const pointer of [lane, stream, exact]) code.advance(pointer, PAIR_BYTES);
    });
    code.storeInteger(events, 0, passed);
    code.join(passedAny, passed);
    code.advance(events, 4);
    code.advance(streamRow, setting.streamBytes);
    code.advance(exactRow, STATE_BYTES);
  });
  return code.finish("score", passedAny);
}

/** One step of one pair of lanes; returns the mask of lanes that passed periapsis in it. */
function writeScores(
  code: LaneCode,
  setting: ScoreSetting,
  lane: Pointer,
  stream: Pointer,
  exact: Pointer,
  nodes: readonly [Pointer, Pointer],
): Operand | null {
  const [x, y, vx, vy] = [0, 1, 2, 3].map((c) => code.load(stream, c * ROW)) as unknown as Four;
  const [xe, ye, vxe, vye] = [0, 1, 2, 3].map((c) => code.row(exact, c * ROW)) as unknown as Four;
  const values: StepValues = {
    ...{ code, lane, x, y, vx, vy, xe, ye, vxe, vye },
    r2: code.add(code.mul(x, x), code.mul(y, y)),
    v2: code.add(code.mul(vx, vx), code.mul(vy, vy)),
    rising: code.add(code.mul(x, vx), code.mul(y, vy)),
  };
  const step = code.add(code.row(lane, scoreRows.step), code.constant(1));
  code.store(lane, scoreRows.step, step);
  const alive = writeAlive(values);
  code.store(lane, scoreRows.alive, alive);
  code.store(lane, scoreRows.lastAlive, code.select(alive, step, code.row(lane, scoreRows.lastAlive)));
  const keep = (name: StepMeasure, error: Operand): void => {
    if (!setting.measures.has(name)) return;
    const size = code.abs(error);
    const largest = code.load(lane, maximumRows[name]);
    const larger = code.and(code.greater(size, largest), alive);
    code.store(lane, maximumRows[name], code.select(larger, size, largest));
    code.store(lane, maximumAtRows[name], code.select(larger, step, code.row(lane, maximumAtRows[name])));
  };
  writeInvariants(values, setting, keep);
  if (setting.measures.has("apsis")) writeApsis(values, nodes, keep);
  const displaced = (["position", "alongTrack", "radial"] as const).some((name) =>
    setting.measures.has(name),
  );
  if (setting.measures.has("phase") || displaced) {
    const phase = writePhase(values, nodes, alive);
    keep("phase", phase);
    if (displaced) writeDisplacements(values, phase, setting, keep);
  }
  return setting.passages ? writePassage(values, setting.circular, alive) : null;
}

type Four = readonly [Operand, Operand, Operand, Operand];
type Keep = (name: StepMeasure, error: Operand) => void;

/** Alive so far and at this step: `findEnd` has nothing to say. */
function writeAlive({ code, lane, r2, v2, rising }: StepValues): Operand {
  const c = (value: number): Operand => code.constant(value);
  const infinity = c(Number.POSITIVE_INFINITY);
  const finite = code.and(code.less(r2, infinity), code.less(v2, infinity));
  const apart = code.greaterEqual(r2, code.row(lane, scoreRows.collision2));
  const energy = code.sub(code.mul(c(0.5), v2), code.div(c(1), code.sqrt(r2)));
  const unbound = code.and(code.greaterEqual(energy, c(0)), code.greater(rising, c(0)));
  const escaped = code.and(code.greater(r2, c(ESCAPE_DISTANCE * ESCAPE_DISTANCE)), unbound);
  const sound = code.andNot(code.and(finite, apart), escaped);
  return code.and(code.row(lane, scoreRows.alive), sound);
}

function writeInvariants(values: StepValues, { measures }: ScoreSetting, keep: Keep): void {
  const { code, lane, r2, v2 } = values;
  const row = (name: keyof typeof scoreRows): Operand => code.row(lane, scoreRows[name]);
  const c = (value: number): Operand => code.constant(value);
  if (measures.has("energy")) {
    const energy = code.sub(code.mul(c(0.5), v2), code.div(c(1), code.sqrt(r2)));
    keep("energy", code.mul(code.sub(energy, row("energy0")), row("energyScale")));
  }
  if (measures.has("angularMomentum")) {
    const momentum = writeMomentum(values);
    keep("angularMomentum", code.mul(code.sub(momentum, row("momentum0")), row("momentumScale")));
  }
}

function writeMomentum({ code, x, y, vx, vy }: StepValues): Operand {
  return code.sub(code.mul(x, vy), code.mul(y, vx));
}

function writeApsis(values: StepValues, nodes: readonly [Pointer, Pointer], keep: Keep): void {
  const { code, lane, x, y, vx, vy, r2 } = values;
  const momentum = writeMomentum(values);
  const inverse = code.div(code.constant(1), code.sqrt(r2));
  const ax = code.sub(code.mul(vy, momentum), code.mul(x, inverse));
  const ay = code.sub(code.mul(code.negate(vx), momentum), code.mul(y, inverse));
  const ex = code.row(lane, scoreRows.apsisX);
  const ey = code.row(lane, scoreRows.apsisY);
  const cross = code.sub(code.mul(ex, ay), code.mul(ey, ax));
  const dot = code.add(code.mul(ex, ax), code.mul(ey, ay));
  const angle = writeAngle(code, cross, dot, nodes);
  writeNearestTurn(code, angle, code.load(lane, scoreRows.apsis));
  code.store(lane, scoreRows.apsis, angle);
  keep("apsis", angle);
}

function writePhase(values: StepValues, nodes: readonly [Pointer, Pointer], alive: Operand): Operand {
  const { code, lane, x, y, xe, ye } = values;
  const cross = code.sub(code.mul(xe, y), code.mul(ye, x));
  const dot = code.add(code.mul(xe, x), code.mul(ye, y));
  const previous = code.load(lane, scoreRows.phase);
  const phase = writeAngle(code, cross, dot, nodes);
  writeNearestTurn(code, phase, previous);
  const jump = code.abs(code.sub(phase, previous));
  const jumped = code.and(code.greater(jump, code.constant(0.5 * Math.PI)), alive);
  code.store(lane, scoreRows.uncertain, code.or(code.row(lane, scoreRows.uncertain), jumped));
  code.store(lane, scoreRows.phase, phase);
  return phase;
}

function writeDisplacements(
  { code, x, y, xe, ye, vxe, vye }: StepValues,
  phase: Operand,
  { measures }: ScoreSetting,
  keep: Keep,
): void {
  const dx = code.sub(x, xe);
  const dy = code.sub(y, ye);
  const dot = (ax: Operand, ay: Operand, bx: Operand, by: Operand): Operand =>
    code.add(code.mul(ax, bx), code.mul(ay, by));
  if (measures.has("position")) keep("position", code.sqrt(dot(dx, dy, dx, dy)));
  if (measures.has("alongTrack")) {
    const along = code.div(dot(dx, dy, vxe, vye), code.sqrt(dot(vxe, vye, vxe, vye)));
    const far = code.greater(code.abs(phase), code.constant(ALONG_TRACK_PHASE_LIMIT));
    keep("alongTrack", code.select(far, phase, along));
  }
  if (measures.has("radial")) {
    keep("radial", code.div(dot(dx, dy, xe, ye), code.sqrt(dot(xe, ye, xe, ye))));
  }
}

/** q.v, or the side of the direction of the start, rises through zero in this step. */
function writePassage(values: StepValues, circular: boolean, alive: Operand): Operand {
  const { code, lane, x, y, rising } = values;
  const zero = code.constant(0);
  const startX = code.row(lane, scoreRows.startX);
  const startY = code.row(lane, scoreRows.startY);
  const side = circular ? code.sub(code.mul(startX, y), code.mul(startY, x)) : rising;
  const before = code.less(code.row(lane, scoreRows.side), zero);
  const rises = code.and(code.and(before, code.greaterEqual(side, zero)), alive);
  code.store(lane, scoreRows.side, side);
  if (!circular) return rises;
  const ahead = code.greater(code.add(code.mul(x, startX), code.mul(y, startY)), zero);
  return code.and(rises, ahead);
}
