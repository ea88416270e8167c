/** A vector of two or three components, any unit. */
export type Vector = readonly number[];

/** Position and velocity of a point, in matching units. */
export interface Motion {
  readonly position: Vector;
  readonly velocity: Vector;
}
