import { propagate } from "../conics/propagate.ts";
import { requireFinite, requireMotion, requirePositive } from "../errors.ts";
import type { Motion, Vector } from "../vector.ts";

/** Both bodies of a pair, in one frame and matching units. */
export interface TwoBodies {
  readonly first: Motion;
  readonly second: Motion;
}

/** The pair as one body: relative motion (second minus first) and the motion of the barycentre. */
export interface RelativeMotion {
  readonly relative: Motion;
  readonly barycentre: Motion;
}

/** a + weight b. */
function combine(a: Vector, weight: number, b: Vector): number[] {
  return a.map((value, k) => value + weight * b[k]!);
}

function combineMotion(a: Motion, weight: number, b: Motion): Motion {
  return {
    position: combine(a.position, weight, b.position),
    velocity: combine(a.velocity, weight, b.velocity),
  };
}

/**
 * Both bodies from the relative motion and the barycentre: first = barycentre - m2/(m1 + m2) relative, second = barycentre + m1/(m1 +
 * m2) relative. Masses in one unit; a mass ratio m2/m1 is (1, ratio). Error at most 2 ulp of the larger term of each
 * component, and the total momentum is that of the barycentre to 4 ulp of the larger of the two momenta.
 * @throws InvalidInputError unless both masses are finite and positive and the motions finite, in two or three components
 */
export function splitTwoBodies(motion: RelativeMotion, firstMass: number, secondMass: number): TwoBodies {
  requireMotion("splitTwoBodies.relative", motion.relative);
  requireMotion("splitTwoBodies.barycentre", motion.barycentre);
  requirePositive("splitTwoBodies.firstMass", firstMass);
  requirePositive("splitTwoBodies.secondMass", secondMass);
  const total = firstMass + secondMass;
  return {
    first: combineMotion(motion.barycentre, -secondMass / total, motion.relative),
    second: combineMotion(motion.barycentre, firstMass / total, motion.relative),
  };
}

/**
 * Relative motion and barycentre of both bodies: the inverse of {@link splitTwoBodies}, to 2 ulp of the larger term of each component.
 * @throws InvalidInputError unless both masses are finite and positive and the motions finite, in two or three components
 */
export function joinTwoBodies(bodies: TwoBodies, firstMass: number, secondMass: number): RelativeMotion {
  requireMotion("joinTwoBodies.first", bodies.first);
  requireMotion("joinTwoBodies.second", bodies.second);
  requirePositive("joinTwoBodies.firstMass", firstMass);
  requirePositive("joinTwoBodies.secondMass", secondMass);
  const relative = combineMotion(bodies.second, -1, bodies.first);
  // The barycentre from the heavier body: its distance from there is the smaller one.
  const total = firstMass + secondMass;
  const barycentre =
    firstMass >= secondMass
      ? combineMotion(bodies.first, secondMass / total, relative)
      : combineMotion(bodies.second, -firstMass / total, relative);
  return { relative, barycentre };
}

/**
 * Both bodies after the time dt: the relative motion follows its conic with the gravitational parameter of the sum of the masses, the
 * barycentre moves on evenly. `gravitationalParameter` is G (m1 + m2) in the units of the motions (1 in normalised units).
 * @throws InvalidInputError as {@link splitTwoBodies} and {@link propagate} do
 */
export function propagateTwoBodies(
  bodies: TwoBodies,
  firstMass: number,
  secondMass: number,
  dt: number,
  gravitationalParameter = 1,
): TwoBodies {
  requireFinite("propagateTwoBodies.dt", dt);
  const { relative, barycentre } = joinTwoBodies(bodies, firstMass, secondMass);
  const moved: Motion = {
    position: combine(barycentre.position, dt, barycentre.velocity),
    velocity: barycentre.velocity,
  };
  return splitTwoBodies(
    { relative: propagate(relative, dt, gravitationalParameter), barycentre: moved },
    firstMass,
    secondMass,
  );
}
