import { cellShift, cellSize, splitter } from "@perigauge/kepler";
import { type FunctionCode, LaneCode, type Operand, PAIR_BYTES, type Pointer } from "@perigauge/steppers";
import { EXACT_AT, STATE_BYTES, STREAM_AT, trackRows, UNEVEN_STREAM_BYTES } from "./memory-map.ts";

/** Adding and subtracting 1.5 2^52 rounds to the nearest integer. */
const TO_NEAREST = 6755399441055744;
const TWO_PI = 2 * Math.PI;
const ROW = STATE_BYTES / 4;

/**
 * The function `track(count, width)`: `ReferenceTrack.statesAtSteps` in lanes, operation for operation, each lane with an orbit, a step
 * and a step number of its own; or, as `trackTimes`, `statesAtTimes` of the times in the stream. Writes rows 1 .. count of the exact states.
 */
export function trackCode(times: "steps" | "stream"): FunctionCode {
  const code = new LaneCode(2, 7);
  const [count, width] = [code.parameter(0), code.parameter(1)];
  const [lane, exact, out] = [code.pointer(), code.pointer(), code.pointer()];
  const [stream, streamRow] = [code.pointer(), code.pointer()];
  const [first, second] = [code.pointer(), code.pointer()];
  code.set(out, EXACT_AT + STATE_BYTES);
  code.set(streamRow, STREAM_AT + UNEVEN_STREAM_BYTES);
  const overLanes = (body: () => void): void => {
    code.set(lane, 0);
    code.set(exact, out);
    code.set(stream, streamRow);
    code.repeat(lane, width, () => {
      body();
      for (const pointer of [lane, exact, stream]) code.advance(pointer, PAIR_BYTES);
    });
  };
  code.countDown(count, () => {
    overLanes(() => {
      if (times === "steps") writeMeanAnomaly(code, lane);
      else writeMeanAnomalyAt(code, lane, stream);
    });
    overLanes(() => writeNode(code, lane, [first, second]));
    overLanes(() => writeCorrection(code, lane));
    overLanes(() => writeState(code, lane, exact));
    code.advance(out, STATE_BYTES);
    code.advance(streamRow, UNEVEN_STREAM_BYTES);
  });
  return code.finish(times === "steps" ? "track" : "trackTimes");
}

const withoutTurns = (code: LaneCode, x: Operand): Operand => {
  const shift = code.constant(TO_NEAREST);
  return code.sub(x, code.sub(code.add(x, shift), shift));
};

/** Mean anomaly at the time in the stream, in turns, two words: an exact product, whole turns dropped, plus the start. */
function writeMeanAnomalyAt(code: LaneCode, lane: Pointer, stream: Pointer): void {
  const row = (name: keyof typeof trackRows): Operand => code.row(lane, trackRows[name]);
  const hi = code.load(stream, 4 * ROW);
  const lo = code.load(stream, 5 * ROW);
  const [b1, b2] = [row("rateUpper"), row("rateLower")];
  const p = code.mul(hi, row("rateHi"));
  const ta = code.mul(code.constant(splitter), hi);
  const a1 = code.sub(ta, code.sub(ta, hi));
  const a2 = code.sub(hi, a1);
  let low = code.sub(code.mul(a1, b1), p);
  for (const product of [code.mul(a1, b2), code.mul(a2, b1), code.mul(a2, b2)]) low = code.add(low, product);
  low = code.add(low, code.add(code.mul(hi, row("rateLo")), code.mul(lo, row("rateHi"))));
  const f = withoutTurns(code, p);
  const u = code.add(f, low);
  const ut = code.sub(u, f);
  const uLow = code.add(code.sub(f, code.sub(u, ut)), code.sub(low, ut));
  const g = withoutTurns(code, u);
  const startHi = code.load(lane, trackRows.startHi);
  const v = code.add(g, startHi);
  const vt = code.sub(v, g);
  // A run that has diverged may bring any time; its lane must still look inside its table.
  const mean = withoutTurns(code, v);
  const bounded = code.lessEqual(code.abs(mean), code.constant(0.5));
  code.store(lane, trackRows.meanHi, code.and(bounded, mean));
  const vLow = code.add(code.sub(g, code.sub(v, vt)), code.sub(startHi, vt));
  code.store(lane, trackRows.meanLo, code.add(vLow, code.add(uLow, row("startLo"))));
}

/** Mean anomaly of the next step in turns, two words. */
function writeMeanAnomaly(code: LaneCode, lane: Pointer): void {
  const row = (name: keyof typeof trackRows): Operand => code.row(lane, trackRows[name]);
  const c = (value: number): Operand => code.constant(value);
  const startHi = code.load(lane, trackRows.startHi);
  const k = code.add(row("step"), c(1));
  code.store(lane, trackRows.step, k);
  const s = code.add(withoutTurns(code, code.mul(k, row("w1"))), withoutTurns(code, code.mul(k, row("w2"))));
  const f = withoutTurns(code, s);
  const p3 = code.mul(k, row("w3"));
  const u = code.add(f, p3);
  const ut = code.sub(u, f);
  const uLow = code.add(code.sub(f, code.sub(u, ut)), code.sub(p3, ut));
  const v = code.add(u, startHi);
  const vt = code.sub(v, u);
  const vLow = code.add(code.sub(u, code.sub(v, vt)), code.sub(startHi, vt));
  code.store(lane, trackRows.meanHi, withoutTurns(code, v));
  const start = code.add(row("startLo"), code.mul(k, row("w4")));
  code.store(lane, trackRows.meanLo, code.add(vLow, code.add(uLow, start)));
}

/** Looks the node of the table up and forms the arguments of the correction. */
function writeNode(code: LaneCode, lane: Pointer, [first, second]: readonly [Pointer, Pointer]): void {
  const row = (name: keyof typeof trackRows): Operand => code.row(lane, trackRows[name]);
  const c = (value: number): Operand => code.constant(value);
  const hi = code.load(lane, trackRows.meanHi);
  const side = code.select(code.less(hi, c(0)), c(-1), c(1));
  const turns = code.mul(side, hi);
  // The number of the table's cell is the upper part of the bits; a row of it is 8 cellSize bytes long.
  const cell = code.shiftRight(code.add(turns, row("offset")), 32 + cellShift);
  const address = code.addIntegers(code.shiftLeft(cell, Math.log2(8 * cellSize)), row("tableBias"));
  code.extract(first, address, 0);
  code.extract(second, address, 1);
  const columns = [0, 16, 32, 48].flatMap((offset) => {
    const [a, b] = [code.load(first, offset), code.load(second, offset)];
    return [code.lows(a, b), code.highs(a, b)];
  });
  const [meanNode, meanNodeLow, cosNode, sinNode, alongNode, acrossNode, radiusNode, inverse] =
    columns as unknown as readonly [Operand, Operand, Operand, Operand, Operand, Operand, Operand, Operand];
  const scale = code.mul(row("e"), inverse);
  const offNode = code.sub(code.mul(side, row("meanLo")), meanNodeLow);
  const q = code.mul(code.add(code.sub(turns, meanNode), offNode), code.mul(c(TWO_PI), inverse));
  const kept = { side, cosNode, sinNode, alongNode, acrossNode, radiusNode, q };
  for (const [name, value] of Object.entries(kept))
    code.store(lane, trackRows[name as keyof typeof kept], value);
  code.store(lane, trackRows.sineTerm, code.mul(scale, sinNode));
  code.store(lane, trackRows.cosineTerm, code.mul(scale, cosNode));
}

/** State from the node and the anomaly's correction. */
function writeState(code: LaneCode, lane: Pointer, exact: Pointer): void {
  const row = (name: keyof typeof trackRows): Operand => code.row(lane, trackRows[name]);
  const d = code.load(lane, trackRows.correction);
  const [side, cosNode, sinNode] = [row("side"), row("cosNode"), row("sinNode")];
  const z = code.mul(d, d);
  const sine = code.mul(d, series(code, z, [1, -1 / 6, 1 / 120, -1 / 5040]));
  const versine = code.mul(z, series(code, z, [0.5, -1 / 24, 1 / 720]));
  const dCos = code.add(code.mul(cosNode, versine), code.mul(sinNode, sine));
  const dSin = code.sub(code.mul(cosNode, sine), code.mul(sinNode, versine));
  const axisRatio = row("axisRatio");
  const along = code.sub(row("alongNode"), dCos);
  const across = code.mul(side, code.add(row("acrossNode"), code.mul(axisRatio, dSin)));
  const rate = code.div(row("meanMotion"), code.add(row("radiusNode"), code.mul(row("e"), dCos)));
  const vAlong = code.mul(code.mul(code.negate(side), code.add(sinNode, dSin)), rate);
  const vAcross = code.mul(code.mul(axisRatio, code.sub(cosNode, dCos)), rate);
  const turned = (x: Operand, y: Operand, p: Operand, q: Operand): Operand =>
    code.add(code.mul(p, x), code.mul(q, y));
  code.store(exact, 0, turned(along, across, row("px"), row("qx")));
  code.store(exact, ROW, turned(along, across, row("py"), row("qy")));
  code.store(exact, 2 * ROW, turned(vAlong, vAcross, row("px"), row("qx")));
  code.store(exact, 3 * ROW, turned(vAlong, vAcross, row("py"), row("qy")));
}

/** `anomalyCorrection` of the reference package in lanes. */
function writeCorrection(code: LaneCode, lane: Pointer): void {
  const c = (value: number): Operand => code.constant(value);
  const q = code.load(lane, trackRows.q);
  const a = code.load(lane, trackRows.sineTerm);
  const b = code.load(lane, trackRows.cosineTerm);
  const a2 = code.mul(c(0.5), a);
  const b6 = code.mul(b, c(1 / 6));
  const cubic = code.sub(code.mul(code.mul(c(2), a2), a2), b6);
  const inner = code.sub(code.mul(c(5), b6), code.mul(code.mul(c(5), a2), a2));
  const quartic = code.mul(a2, code.add(inner, c(1 / 12)));
  const reversed = code.add(
    c(1),
    code.mul(q, code.add(code.negate(a2), code.mul(q, code.add(cubic, code.mul(q, quartic))))),
  );
  const d = code.mul(q, reversed);
  const z = code.mul(d, d);
  const versine = code.mul(z, series(code, z, [0.5, -1 / 24, 1 / 720]));
  const lag = code.mul(code.mul(d, z), series(code, z, [1 / 6, -1 / 120, 1 / 5040]));
  const residual = code.add(code.add(code.sub(d, q), code.mul(a, versine)), code.mul(b, lag));
  const slope = code.add(code.add(c(1), code.mul(a, code.sub(d, lag))), code.mul(b, versine));
  code.store(lane, trackRows.correction, code.sub(d, code.div(residual, slope)));
}

/** first + z (second + z (third + ...)). */
function series(code: LaneCode, z: Operand, coefficients: readonly number[]): Operand {
  const terms = coefficients.map((value) => code.constant(value));
  let sum = terms.at(-1) as Operand;
  for (const term of terms.slice(0, -1).reverse()) sum = code.add(term, code.mul(z, sum));
  return sum;
}
