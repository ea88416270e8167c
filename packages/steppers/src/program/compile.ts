import { emitJavaScript } from "./emit-javascript.ts";
import type { Executable } from "./executable.ts";
import { interpret } from "./interpret.ts";
import type { Program } from "./program.ts";

/** The fastest way to run a program here: emitted JavaScript, or the interpreter where the host forbids code generation. */
export function compile(program: Program): Executable {
  try {
    return emitJavaScript(program);
  } catch (error) {
    // A content security policy answers `new Function` with an EvalError; anything else is a fault of ours and must be seen.
    if (error instanceof EvalError) return interpret(program);
    throw error;
  }
}
