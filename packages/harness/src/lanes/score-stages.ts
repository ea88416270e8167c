import type { LaneCode, Operand, Pointer } from "@perigauge/steppers";
import { ALONG_TRACK_PHASE_LIMIT } from "../score/displacement-errors.ts";
import { ESCAPE_DISTANCE } from "../score/run-end.ts";
import type { StepMeasure } from "../score/score.ts";
import { writeAngle, writeNearestTurn } from "./angle-code.ts";
import { maximumAtRows, maximumRows, STATE_BYTES, scoreRows } from "./memory-map.ts";

/** What a scoring kernel is made for. */
export interface ScoreSetting {
  readonly measures: ReadonlySet<StepMeasure>;
  readonly passages: boolean;
  /** Of a circular orbit: passages are returns of the polar angle. */
  readonly circular: boolean;
  /** Steps take unequal times, which the stream holds; a row whose time is that before it is no step. */
  readonly uneven: boolean;
  /** Bytes of the stream per step. */
  readonly streamBytes: number;
}

const ROW = STATE_BYTES / 4;

/** Pointers to the pair of lanes at work: in the rows of lanes, in the stream, in the exact states. */
export interface PairPlaces {
  readonly lane: Pointer;
  readonly stream: Pointer;
  readonly exact: Pointer;
}

/** Writes one stage of scoring for one pair of lanes. Stages are short, so that several pairs are under way at once. */
export class ScoreStages {
  private readonly code: LaneCode;
  private readonly setting: ScoreSetting;
  private readonly places: PairPlaces;
  private readonly nodes: readonly [Pointer, Pointer];

  constructor(code: LaneCode, setting: ScoreSetting, places: PairPlaces, nodes: readonly [Pointer, Pointer]) {
    this.code = code;
    this.setting = setting;
    this.places = places;
    this.nodes = nodes;
  }

  /** `findEnd`, energy, angular momentum; returns the mask of lanes that are alive so far and at this step. */
  endsAndInvariants(): Operand {
    const { code } = this;
    const { measures } = this.setting;
    const [x, y] = this.position("stream");
    const [vx, vy] = this.velocity("stream");
    const step = code.add(this.row("step"), this.stepsMade());
    this.store("step", step);
    const r2 = this.dot(x, y, x, y);
    const v2 = this.dot(vx, vy, vx, vy);
    const inverse = code.div(this.constant(1), code.sqrt(r2));
    const energy = code.sub(code.mul(this.constant(0.5), v2), inverse);
    const alive = this.alive(r2, v2, energy);
    this.store("alive", alive);
    this.store("lastAlive", code.select(alive, step, this.row("lastAlive")));
    if (measures.has("energy")) {
      this.keep("energy", code.mul(code.sub(energy, this.row("energy0")), this.row("energyScale")), alive);
    }
    const momentum = code.sub(code.mul(x, vy), code.mul(y, vx));
    if (measures.has("angularMomentum")) {
      const error = code.mul(code.sub(momentum, this.row("momentum0")), this.row("momentumScale"));
      this.keep("angularMomentum", error, alive);
    }
    if (measures.has("apsis")) {
      this.store("inverse", inverse);
      this.store("momentum", momentum);
    }
    return alive;
  }

  /** 1, or 0 where the row repeats the one before it. */
  private stepsMade(): Operand {
    const { code } = this;
    if (!this.setting.uneven) return this.constant(1);
    const { stream } = this.places;
    const { streamBytes } = this.setting;
    const changed = [4, 5].map((k) =>
      code.notEqual(code.row(stream, streamBytes + k * ROW), code.row(stream, k * ROW)),
    ) as [Operand, Operand];
    return code.and(code.or(...changed), this.constant(1));
  }

  /** What is kept of the place of a maximum: the step, or its time. */
  private place(): Operand {
    const { stream } = this.places;
    return this.setting.uneven ? this.code.row(stream, this.setting.streamBytes + 4 * ROW) : this.row("step");
  }

  private alive(r2: Operand, v2: Operand, energy: Operand): Operand {
    const { code } = this;
    const infinity = this.constant(Number.POSITIVE_INFINITY);
    const finite = code.and(code.less(r2, infinity), code.less(v2, infinity));
    const apart = code.greaterEqual(r2, this.row("collision2"));
    const zero = this.constant(0);
    const unbound = code.and(code.greaterEqual(energy, zero), code.greater(this.rising(), zero));
    const escaped = code.and(code.greater(r2, this.constant(ESCAPE_DISTANCE * ESCAPE_DISTANCE)), unbound);
    return code.and(this.row("alive"), code.andNot(code.and(finite, apart), escaped));
  }

  /** Mask of lanes where q.v, or the side of the direction of the start, rises through zero in this step. */
  passage(alive: Operand): Operand {
    const { code } = this;
    const { circular } = this.setting;
    const [x, y] = this.position("stream");
    const zero = this.constant(0);
    const startX = this.row("startX");
    const startY = this.row("startY");
    const side = circular ? code.sub(code.mul(startX, y), code.mul(startY, x)) : this.rising();
    const before = code.less(this.row("side"), zero);
    const rises = code.and(code.and(before, code.greaterEqual(side, zero)), alive);
    this.store("side", side);
    return circular ? code.and(rises, code.greater(this.dot(x, y, startX, startY), zero)) : rises;
  }

  /** `ApsisErrors`. */
  apsis(): void {
    const { code } = this;
    const [x, y] = this.position("stream");
    const [vx, vy] = this.velocity("stream");
    const momentum = code.load(this.places.lane, scoreRows.momentum);
    const inverse = code.load(this.places.lane, scoreRows.inverse);
    const ax = code.sub(code.mul(vy, momentum), code.mul(x, inverse));
    const ay = code.sub(code.mul(code.negate(vx), momentum), code.mul(y, inverse));
    const [ex, ey] = [this.row("apsisX"), this.row("apsisY")];
    const cross = code.sub(code.mul(ex, ay), code.mul(ey, ax));
    const angle = writeAngle(code, cross, this.dot(ex, ey, ax, ay), this.nodes);
    writeNearestTurn(code, angle, code.load(this.places.lane, scoreRows.apsis));
    this.store("apsis", angle);
    this.keep("apsis", angle, this.row("alive"));
  }

  /** `PhaseErrors`. */
  phase(): void {
    const { code } = this;
    const [x, y] = this.position("stream");
    const [xe, ye] = this.position("exact");
    const cross = code.sub(code.mul(xe, y), code.mul(ye, x));
    const previous = code.load(this.places.lane, scoreRows.phase);
    const angle = writeAngle(code, cross, this.dot(xe, ye, x, y), this.nodes);
    writeNearestTurn(code, angle, previous);
    const jump = code.abs(code.sub(angle, previous));
    const jumped = code.and(code.greater(jump, this.constant(0.5 * Math.PI)), this.row("alive"));
    this.store("uncertain", code.or(this.row("uncertain"), jumped));
    this.store("phase", angle);
    if (this.setting.measures.has("phase")) this.keep("phase", angle, this.row("alive"));
  }

  /** `displacementErrors`; the phase is known. */
  displacements(): void {
    const { code } = this;
    const { measures } = this.setting;
    const [x, y] = this.position("stream");
    const [xe, ye] = this.position("exact");
    const [dx, dy] = [code.sub(x, xe), code.sub(y, ye)];
    const keep = (name: StepMeasure, error: Operand): void => {
      this.keep(name, error, this.row("alive"));
    };
    if (measures.has("position")) keep("position", code.sqrt(this.dot(dx, dy, dx, dy)));
    if (measures.has("alongTrack")) {
      const [vxe, vye] = this.velocity("exact");
      const along = code.div(this.dot(dx, dy, vxe, vye), code.sqrt(this.dot(vxe, vye, vxe, vye)));
      const phase = code.load(this.places.lane, scoreRows.phase);
      const far = code.greater(code.abs(phase), this.constant(ALONG_TRACK_PHASE_LIMIT));
      keep("alongTrack", code.select(far, phase, along));
    }
    if (measures.has("radial")) {
      keep("radial", code.div(this.dot(dx, dy, xe, ye), code.sqrt(this.dot(xe, ye, xe, ye))));
    }
  }

  /** `Maximum`. */
  private keep(name: StepMeasure, error: Operand, alive: Operand): void {
    const { code } = this;
    const { lane } = this.places;
    const size = code.abs(error);
    const largest = code.load(lane, maximumRows[name]);
    const larger = code.and(code.greater(size, largest), alive);
    code.store(lane, maximumRows[name], code.select(larger, size, largest));
    code.store(
      lane,
      maximumAtRows[name],
      code.select(larger, this.place(), code.row(lane, maximumAtRows[name])),
    );
  }

  private position(of: "stream" | "exact"): readonly [Operand, Operand] {
    return [this.component(of, 0), this.component(of, 1)];
  }

  private velocity(of: "stream" | "exact"): readonly [Operand, Operand] {
    return [this.component(of, 2), this.component(of, 3)];
  }

  /** The pointer into the stream stands at the row before. */
  private component(of: "stream" | "exact", c: number): Operand {
    return this.code.load(this.places[of], c * ROW + (of === "stream" ? this.setting.streamBytes : 0));
  }

  private rising(): Operand {
    return this.dot(...this.position("stream"), ...this.velocity("stream"));
  }

  private dot(ax: Operand, ay: Operand, bx: Operand, by: Operand): Operand {
    return this.code.add(this.code.mul(ax, bx), this.code.mul(ay, by));
  }

  private row(name: keyof typeof scoreRows): Operand {
    return this.code.row(this.places.lane, scoreRows[name]);
  }

  private store(name: keyof typeof scoreRows, value: Operand): void {
    this.code.store(this.places.lane, scoreRows[name], value);
  }

  private constant(value: number): Operand {
    return this.code.constant(value);
  }
}
