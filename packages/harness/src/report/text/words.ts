import { LIMIT_KEYS, type LimitKey } from "../../choose/choice.ts";
import type { Scenario } from "../../scenario/scenario.ts";
import { formatCount, formatNumber, NO_BREAK, superscript } from "./number.ts";

const LIMIT_WORDS: Readonly<Record<LimitKey, { readonly words: string; readonly unit: string }>> = {
  alongTrackKm: { words: "position along the track", unit: "km" },
  radialKm: { words: "radial position", unit: "km" },
  positionKm: { words: "position", unit: "km" },
  timingSeconds: { words: "time of periapsis passage", unit: "s" },
  semiMajorAxisM: { words: "semi-major axis", unit: "m" },
  apsisDeg: { words: "direction of periapsis", unit: "°" },
  phaseRad: { words: "phase", unit: "rad" },
  energyRelative: { words: "energy, relative", unit: "" },
};

/** A limit's key, with or without horizon (`alongTrackKm@7`), in words. */
export function limitWords(key: string): string {
  const [name = "", days] = key.split("@");
  const words = isLimitKey(name) ? LIMIT_WORDS[name].words : name;
  return days === undefined ? words : `${words}, first ${dayWords(Number(days))}`;
}

const REQUIREMENT_WORDS: Readonly<Record<string, string>> = {
  fixedStep: "a fixed step",
  symplectic: "a symplectic stepper",
  timeReversible: "a time-reversible stepper",
  explicit: "an explicit stepper",
  selfStarting: "a self-starting stepper",
  denseOutput: "dense output",
  evaluationsPerOrbit: "force evaluations per orbit",
};

/**
 * A sentence of a result with the keys of limits and requirements in words: `bound by timingSeconds` becomes `bound by time of periapsis
 * passage`, and a number that follows the key of a limit directly (`alongTrackKm is 3.2`) gets its unit.
 */
export function withWords(sentence: string): string {
  return sentence
    .replace(
      /\b([a-z]+[A-Z]\w*(?:@\d+(?:\.\d+)?)?|symplectic(?= is required)|explicit(?= is required))(?![\w-])( is [-\d.,e]*\d)?/g,
      (whole, key: string, value: string | undefined, place: number) => {
        const [name = ""] = key.split("@");
        if (!isLimitKey(name)) {
          const words = REQUIREMENT_WORDS[name];
          return words === undefined ? whole : `${words}${value ?? ""}`;
        }
        const words = `${limitWords(key)}${value === undefined ? "" : withUnit(value, limitUnit(key))}`;
        return sentence.slice(0, place).endsWith(". ")
          ? words.charAt(0).toUpperCase() + words.slice(1)
          : words;
      },
    )
    .replace(
      /(\d(?:\.\d+)?)e([-+]?\d+)/g,
      (_, mantissa: string, power: string) =>
        `${mantissa}${NO_BREAK}×${NO_BREAK}10${superscript(Number(power))}`,
    );
}

export function limitUnit(key: string): string {
  const [name = ""] = key.split("@");
  return isLimitKey(name) ? LIMIT_WORDS[name].unit : "";
}

/** A value of a limit with its unit; null where it has none (a run that diverged, a measure that is not defined). */
export function limitValue(key: string, value: number | null): string {
  if (value === null) return "not defined";
  const unit = limitUnit(key);
  return unit === "°" ? `${formatNumber(value)}°` : withUnit(formatNumber(value), unit);
}

export function dayWords(days: number): string {
  return days === 1 ? "1 day" : `${formatNumber(days)} days`;
}

export function durationWords(scenario: Scenario): string {
  return "days" in scenario.duration
    ? dayWords(scenario.duration.days)
    : `${formatCount(scenario.duration.orbits)} orbits`;
}

/** The knob of a stepper: its step in seconds, its tolerance, or steps per orbit where equal steps take unequal times. */
export function knobWords(knob: {
  readonly stepSeconds: number | null;
  readonly stepsPerOrbit: number | null;
  readonly tolerance: number | null;
}): string {
  if (knob.stepSeconds !== null) return withUnit(formatNumber(knob.stepSeconds, 5), "s");
  if (knob.tolerance !== null) return `tolerance ${formatNumber(knob.tolerance)}`;
  return knob.stepsPerOrbit === null ? "–" : `${formatNumber(knob.stepsPerOrbit, 4)} uneven steps per orbit`;
}

export function plural(count: number, one: string, many = `${one}s`): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}

/** `a`, `a and b`, `a, b and c`. */
export function listWords(items: readonly string[]): string {
  if (items.length < 2) return items.join("");
  return `${items.slice(0, -1).join(", ")} and ${items.at(-1)}`;
}

function withUnit(text: string, unit: string): string {
  return unit === "" ? text : `${text}${NO_BREAK}${unit}`;
}

function isLimitKey(name: string): name is LimitKey {
  return (LIMIT_KEYS as readonly string[]).includes(name);
}
