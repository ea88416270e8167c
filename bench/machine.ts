import { arch, availableParallelism, loadavg } from "node:os";
import { compilerVersion, FLAGS } from "./c-loop.ts";

/** Where figures were measured. */
export interface Machine {
  readonly processor: string;
  readonly cores: number;
  readonly node: string;
  readonly compiler: string | null;
  readonly compilerFlags: string;
  /** Processes that ran or waited for a core, over the last minute when the bench began: above the cores, others were at work. */
  readonly load: number;
}

export function machine(): Machine {
  return {
    processor: arch(),
    cores: availableParallelism(),
    node: process.version,
    compiler: compilerVersion(),
    compilerFlags: FLAGS.join(" "),
    load: loadavg()[0]!,
  };
}
