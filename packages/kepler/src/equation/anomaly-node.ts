import { type DoubleDouble, ddOf } from "../arithmetic/double-double.ts";
import { ddMinusSin, ddSinCos } from "../arithmetic/double-double-sin-cos.ts";

/** An eccentric anomaly with few bits, and its functions in double-double. */
export interface AnomalyNode {
  readonly anomaly: number;
  readonly sin: DoubleDouble;
  readonly cos: DoubleDouble;
  /** E - sin E, without cancellation. */
  readonly lag: DoubleDouble;
}

/** Nodes made so far: at most 64 an octave, shared by all eccentricities. */
const known: Map<number, AnomalyNode> = new Map();

/** The node at an anomaly in [0, 4), made once. */
export function anomalyNode(anomaly: number): AnomalyNode {
  let node = known.get(anomaly);
  if (node === undefined) {
    const exact = ddOf(anomaly);
    node = { anomaly, ...ddSinCos(exact), lag: ddMinusSin(exact) };
    known.set(anomaly, node);
  }
  return node;
}
