import type { StepperInfo } from "@perigauge/steppers";
import { threeDigits } from "../text/numbers.ts";
import { type ChoiceContext, makeCandidate, runFull } from "./candidate.ts";
import type { CurrentChoice, RankedStepper } from "./choice.ts";
import { limitErrors, margin } from "./limit-errors.ts";
import { describeKnob, fleetEvaluations } from "./ranked.ts";
import { refineSamples } from "./refine-samples.ts";
import { evaluationsPerShortestOrbit } from "./screen.ts";

/** The integrator and step in use today, run in full at that very step: enough or not, by what factor, and what switching saves. */
export async function assessCurrent(
  context: ChoiceContext,
  stepper: StepperInfo,
  winner: RankedStepper | null,
): Promise<CurrentChoice> {
  const { stepSeconds, tolerance } = context.scenario.current ?? {};
  const candidate = makeCandidate(stepper, context);
  const fineness =
    stepSeconds === undefined ? 1 / (tolerance as number) : context.fleet.shortestPeriodSeconds / stepSeconds;
  const readings = await refineSamples(
    context,
    candidate,
    fineness,
    await runFull(context, candidate, candidate.samples, fineness),
  );
  const errors = limitErrors(context.measurer.limits, readings);
  const held = margin(errors);
  const evaluationsTotal = fleetEvaluations(context, stepper, readings);
  const enough = held.margin >= 1;
  const at = candidate.knob.physical(fineness);
  const factor = enough
    ? `holds every limit with a factor of ${threeDigits(held.margin)} to spare on ${held.bindingLimit}`
    : held.margin === 0
      ? `diverges or leaves ${held.bindingLimit} undefined`
      : `breaks ${held.bindingLimit} by a factor of ${threeDigits(1 / held.margin)}`;
  return {
    stepper: stepper.id,
    title: stepper.title,
    symplectic: stepper.symplectic,
    ...at,
    evaluationsPerOrbit: evaluationsPerShortestOrbit(readings, context.fleet.shortestPeriodSeconds),
    evaluationsTotal,
    errors,
    ...held,
    band: null,
    cliff: null,
    floor: null,
    evidence: "run",
    why: `${stepper.id} with ${describeKnob(at)} ${factor}`,
    enough,
    costAgainstChoice: winner === null ? null : evaluationsTotal / winner.evaluationsTotal,
  };
}
