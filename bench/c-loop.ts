import { execFile, execFileSync } from "node:child_process";
import { mkdtempSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { lower, type Operation, type Program } from "@perigauge/steppers";
import type { Contestant } from "./rounds.ts";

const COMPILER = process.env.CC ?? "cc";
export const FLAGS: readonly string[] = ["-O3", "-march=native", "-ffp-contract=off", "-fno-math-errno"];
const infix = { add: "+", sub: "-", mul: "*", div: "/" } as const;

/** First line of what the system's C compiler says of itself; null where there is none. */
export function compilerVersion(): string | null {
  try {
    return execFileSync(COMPILER, ["--version"], { encoding: "utf8" }).split("\n")[0] ?? null;
  } catch {
    return null;
  }
}

/** A step compiled as a scalar loop in C: the same operations in the same order, every state written out. */
export interface CLoop {
  readonly contestant: Contestant;
  /** Loop variables after that many steps, as bits. */
  finalState(steps: number): string;
}

export function cLoop(program: Program, step: number, variables: Float64Array, steps: number): CLoop {
  const folder = mkdtempSync(join(tmpdir(), "perigauge-c-"));
  const [source, binary] = [join(folder, "loop.c"), join(folder, "loop")];
  writeFileSync(source, sourceOf(program));
  execFileSync(COMPILER, [...FLAGS, source, "-o", binary, "-lm"]);
  const words = [step, ...variables].map(hex);
  return {
    contestant: async () => {
      const { stdout } = await promisify(execFile)(binary, ["time", `${steps}`, ...words]);
      return Number(stdout);
    },
    finalState: (count) => execFileSync(binary, ["state", `${count}`, ...words], { encoding: "utf8" }).trim(),
  };
}

/** The 64 bits of a double. */
export function hex(value: number): string {
  return new BigUint64Array(Float64Array.of(value).buffer)[0]!.toString(16).padStart(16, "0");
}

function sourceOf(program: Program): string {
  const { prologue, segments } = lower(program);
  const width = 2 * program.dimension;
  const each = (count: number, line: (k: number) => string): string =>
    Array.from({ length: count }, (_, k) => line(k)).join("\n");
  const name = (id: number): string => {
    const operation = program.operations[id]!;
    if (operation.kind === "step") return "h";
    if (operation.kind === "variable") return `s${operation.index}`;
    if (operation.kind === "constant") return literal(operation.value);
    return `t${id}`;
  };
  const line = (id: number): string => {
    const operation = program.operations[id]!;
    return operation.kind === "variable" ? "" : `const double t${id} = ${expression(operation, name)};`;
  };
  return `#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
static void advance(long steps, double h, double *restrict variables, double *restrict rows) {
${prologue.map(line).join("\n")}
${each(program.inputs, (k) => `double s${k} = variables[${k}];`)}
for (long n = 0; n < steps; n++) {
${segments.flat().map(line).join("\n")}
${program.outputs.map((id, k) => `const double n${k} = ${name(id)};`).join("\n")}
${each(program.inputs, (k) => `s${k} = n${k};`)}
${each(width, (k) => `rows[${width} * n + ${k}] = s${k};`)}
}
${each(program.inputs, (k) => `variables[${k}] = s${k};`)}
}
static double word(const char *text) { uint64_t bits = strtoull(text, 0, 16); double x; memcpy(&x, &bits, 8); return x; }
static double now(void) { struct timespec t; clock_gettime(CLOCK_MONOTONIC, &t); return t.tv_sec * 1e9 + t.tv_nsec; }
int main(int count, char **words) {
  long steps = atol(words[2]);
  double h = word(words[3]), start[${program.inputs}], variables[${program.inputs}];
  for (int k = 0; k < ${program.inputs} && k + 4 < count; k++) start[k] = word(words[k + 4]);
  double *rows = malloc(sizeof(double) * ${width} * steps), best = 1e300;
  for (int run = 0; run < (words[1][0] == 't' ? 200 : 1); run++) {
    memcpy(variables, start, sizeof start);
    double from = now();
    advance(steps, h, variables, rows);
    double taken = (now() - from) / steps;
    if (taken < best) best = taken;
  }
  if (words[1][0] == 't') { printf("%.6f\\n", best); return 0; }
  for (int k = 0; k < ${width}; k++) { uint64_t bits; memcpy(&bits, &variables[k], 8); printf("%016llx ", (unsigned long long)bits); }
  return 0;
}
`;
}

function literal(value: number): string {
  const text = `${value}`;
  return `(${/[.e]/.test(text) ? text : `${text}.0`})`;
}

function expression(operation: Operation, name: (id: number) => string): string {
  const [a, b] = operation.args.map(name);
  switch (operation.kind) {
    case "add":
    case "sub":
    case "mul":
    case "div":
      return `${a} ${infix[operation.kind]} ${b}`;
    case "sqrt":
      return `sqrt(${a})`;
    default:
      throw new Error(`a fixed step with ${operation.kind} has no C loop here`);
  }
}
