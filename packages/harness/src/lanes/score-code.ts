import { type FunctionCode, LaneCode, PAIR_BYTES } from "@perigauge/steppers";
import { EVENTS_AT, EXACT_AT, STATE_BYTES, STREAM_AT } from "./memory-map.ts";
import { type ScoreSetting, ScoreStages } from "./score-stages.ts";

/**
 * The function `score(from, count, width)`: the measures of `RunScorer` at `count` rows of the stream after row `from`, operation for operation, and their
 * running maxima; the ends of `findEnd`; and the steps in which a lane passed periapsis, a bit per lane in the word of the step. Returns
 * all those words joined by "or".
 */
export function scoreCode(setting: ScoreSetting): FunctionCode {
  const code = new LaneCode(3, 10);
  const [from, count, width] = [code.parameter(0), code.parameter(1), code.parameter(2)];
  const pair = { lane: code.pointer(), stream: code.pointer(), exact: code.pointer() };
  const [streamRow, exactRow, events] = [code.pointer(), code.pointer(), code.pointer()];
  const [passed, passedAny] = [code.pointer(), code.pointer()];
  const nodes = [code.pointer(), code.pointer()] as const;
  const { measures } = setting;
  const displaced = (["position", "alongTrack", "radial"] as const).some((name) => measures.has(name));
  const overLanes = (stage: (writer: ScoreStages) => void): void => {
    code.set(pair.lane, 0);
    code.set(pair.stream, streamRow);
    code.set(pair.exact, exactRow);
    code.repeat(pair.lane, width, () => {
      stage(new ScoreStages(code, setting, pair, nodes));
      for (const pointer of Object.values(pair)) code.advance(pointer, PAIR_BYTES);
    });
  };
  code.setScaled(streamRow, from, setting.streamBytes, STREAM_AT);
  code.setScaled(exactRow, from, STATE_BYTES, EXACT_AT + STATE_BYTES);
  code.setScaled(events, from, 4, EVENTS_AT);
  code.set(passedAny, 0);
  code.countDown(count, () => {
    code.set(passed, 0);
    overLanes((writer) => {
      const alive = writer.endsAndInvariants();
      if (setting.passages) code.joinBits(passed, writer.passage(alive), pair.lane);
    });
    if (measures.has("apsis")) overLanes((writer) => writer.apsis());
    if (measures.has("phase") || displaced) overLanes((writer) => writer.phase());
    if (displaced) overLanes((writer) => writer.displacements());
    code.storeInteger(events, 0, passed);
    code.join(passedAny, passed);
    code.advance(events, 4);
    code.advance(streamRow, setting.streamBytes);
    code.advance(exactRow, STATE_BYTES);
  });
  return code.finish("score", passedAny);
}
