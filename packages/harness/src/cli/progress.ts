import { SingleBar } from "cli-progress";

/** Progress on stderr, drawn only where it is a terminal. */
export interface Progress {
  readonly phase: (name: string, detail: string) => void;
  readonly cells: (finished: number) => void;
  readonly stop: () => void;
}

/** How much is still to come is not known while searching, so the bar shows the phase and the cells done. */
export function startProgress(quiet: boolean): Progress {
  if (quiet || !process.stderr.isTTY)
    return { phase: () => undefined, cells: () => undefined, stop: () => undefined };
  const bar = new SingleBar({
    format: "{phase} {detail} · {value} cells · {duration_formatted}",
    stream: process.stderr,
    hideCursor: true,
    clearOnComplete: true,
  });
  let cells = 0;
  bar.start(Number.MAX_SAFE_INTEGER, 0, { phase: "starting", detail: "" });
  return {
    phase: (phase, detail) => bar.update(cells, { phase, detail }),
    cells: (finished) => {
      cells += finished;
      bar.update(cells);
    },
    stop: () => bar.stop(),
  };
}
