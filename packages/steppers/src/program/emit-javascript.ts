import type { Advance, Evaluate, Executable } from "./executable.ts";
import { lower } from "./lower.ts";
import { isCall, type Operation, type Program, type Value } from "./program.ts";

const infix = { add: "+", sub: "-", mul: "*", div: "/" } as const;

/**
 * Compiles a program to JavaScript: one loop over steps, everything in locals, the same operations in the same order as `interpret`, so
 * the same bits. @throws EvalError where the host forbids code generation.
 */
export function emitJavaScript(program: Program): Executable {
  return {
    advance: new Function(...advanceParameters, advanceSource(program)) as Advance,
    evaluate: new Function(...evaluateParameters, evaluateSource(program)) as Evaluate,
  };
}

const advanceParameters = ["steps", "h", "variables", "rows", "times", "force"];
const evaluateParameters = ["h", "inputs", "outputs", "force"];

/** The body of the loop form. */
export function advanceSource(program: Program): string {
  const { inputs, outputs, time } = program;
  const width = 2 * program.dimension;
  const each = (count: number, line: (k: number) => string): string[] =>
    Array.from({ length: count }, (_, k) => line(k));
  return [
    ...head(program),
    ...each(inputs, (k) => `let s${k} = variables[${k}];`),
    `for (let n = 0, o = 0; n < steps; n++, o += ${width}) {`,
    ...body(program, (k) => `s${k}`),
    // A variable whose next value reads another variable's old one is safe: those reads were copied above.
    ...outputs.map((id, k) => `const n${k} = ${name(program, id, (i) => `s${i}`)};`),
    ...each(inputs, (k) => `s${k} = n${k};`),
    ...each(width, (k) => `rows[o + ${k}] = s${k};`),
    ...(time === null ? [] : time.map((variable, k) => `times[2 * n + ${k}] = s${variable};`)),
    "}",
    ...each(inputs, (k) => `variables[${k}] = s${k};`),
  ].join("\n");
}

function evaluateSource(program: Program): string {
  const read = (k: number): string => `i${k}`;
  return [
    ...head(program),
    ...Array.from({ length: program.inputs }, (_, k) => `const i${k} = inputs[${k}];`),
    ...body(program, read),
    ...program.outputs.map((id, k) => `outputs[${k}] = ${name(program, id, read)};`),
  ].join("\n");
}

function head(program: Program): string[] {
  const calls = program.operations.some(isCall);
  return [
    '"use strict";',
    ...(calls ? ["const { acceleration, jerk, position, velocity, result } = force;"] : []),
    ...lower(program).prologue.map((id) => line(program, id, () => "")),
  ];
}

function body(program: Program, variable: (index: number) => string): string[] {
  return lower(program)
    .segments.flat()
    .map((id) => line(program, id, variable))
    .filter((text) => text !== "");
}

function name(program: Program, id: Value, variable: (index: number) => string): string {
  const operation = program.operations[id]!;
  if (operation.kind === "step") return "h";
  if (operation.kind === "variable") return variable(operation.index);
  if (operation.kind === "constant")
    return operation.value < 0 ? `(${operation.value})` : `${operation.value}`;
  return `t${id}`;
}

function line(program: Program, id: Value, variable: (index: number) => string): string {
  const operation = program.operations[id]!;
  if (operation.kind === "variable") return "";
  const args = operation.args.map((arg) => name(program, arg, variable));
  if (isCall(operation)) {
    const d = program.dimension;
    const put = args
      .map((arg, k) => (k < d ? `position[${k}] = ${arg};` : `velocity[${k - d}] = ${arg};`))
      .join(" ");
    return operation.kind === "jerk"
      ? `${put} jerk(position, velocity, result);`
      : `${put} acceleration(position, result);`;
  }
  return `const t${id} = ${expression(operation, args)};`;
}

function expression(operation: Operation, args: readonly string[]): string {
  const [a, b, c] = args;
  switch (operation.kind) {
    case "add":
    case "sub":
    case "mul":
    case "div":
      return `${a} ${infix[operation.kind]} ${b}`;
    case "max":
      return `${a} > ${b} ? ${a} : ${b}`;
    case "less-equal":
      return `${a} <= ${b} ? 1 : 0`;
    case "select":
      return `${a} !== 0 ? ${b} : ${c}`;
    case "sqrt":
      return `Math.sqrt(${a})`;
    case "abs":
      return `Math.abs(${a})`;
    case "component":
      return `result[${operation.index}]`;
    default:
      return "";
  }
}
