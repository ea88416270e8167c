import { requirePositive } from "../errors.ts";

/** A vector in two or three dimensions, any unit. */
export type Vector = readonly number[];

/** Position and velocity of a point. */
export interface Motion {
  readonly position: Vector;
  readonly velocity: Vector;
}

/** Both bodies of a pair, in one frame. */
export interface TwoBodies {
  readonly first: Motion;
  readonly second: Motion;
}

/** Relative motion (second minus first) and the motion of the barycentre. */
export interface RelativeMotion {
  readonly relative: Motion;
  readonly barycentre: Motion;
}

function combine(a: Vector, weight: number, b: Vector): number[] {
  return a.map((value, k) => value + weight * b[k]!);
}

/**
 * Both bodies from the relative motion (second minus first): first = barycentre - m2/(m1 + m2) relative, second = barycentre +
 * m1/(m1 + m2) relative. Masses in any common unit; a mass ratio is (1, ratio).
 * @throws InvalidInputError unless both masses are finite and positive
 */
export function splitTwoBodies(motion: RelativeMotion, firstMass: number, secondMass: number): TwoBodies {
  requirePositive("splitTwoBodies.firstMass", firstMass);
  requirePositive("splitTwoBodies.secondMass", secondMass);
  const total = firstMass + secondMass;
  const { relative, barycentre } = motion;
  return {
    first: {
      position: combine(barycentre.position, -secondMass / total, relative.position),
      velocity: combine(barycentre.velocity, -secondMass / total, relative.velocity),
    },
    second: {
      position: combine(barycentre.position, firstMass / total, relative.position),
      velocity: combine(barycentre.velocity, firstMass / total, relative.velocity),
    },
  };
}

/**
 * Relative motion and barycentre from both bodies: the inverse of {@link splitTwoBodies}.
 * @throws InvalidInputError unless both masses are finite and positive
 */
export function joinTwoBodies(bodies: TwoBodies, firstMass: number, secondMass: number): RelativeMotion {
  requirePositive("joinTwoBodies.firstMass", firstMass);
  requirePositive("joinTwoBodies.secondMass", secondMass);
  const share = secondMass / (firstMass + secondMass);
  const position = combine(bodies.second.position, -1, bodies.first.position);
  const velocity = combine(bodies.second.velocity, -1, bodies.first.velocity);
  return {
    relative: { position, velocity },
    barycentre: {
      position: combine(bodies.first.position, share, position),
      velocity: combine(bodies.first.velocity, share, velocity),
    },
  };
}
