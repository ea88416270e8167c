import { readFile } from "node:fs/promises";
import { InvalidInputError } from "../errors.ts";

/** @throws InvalidInputError where the file cannot be read or is not JSON: one line, where and why. */
export async function readJson(file: string): Promise<unknown> {
  let text: string;
  try {
    text = await readFile(file, "utf8");
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    throw new InvalidInputError(`${file}: cannot be read (${code === "ENOENT" ? "no such file" : code})`);
  }
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new InvalidInputError(
      `${file}: is not JSON (${(error as Error).message.replaceAll(/\s+/g, " ")}${lineOf(text, error)})`,
    );
  }
}

function lineOf(text: string, error: unknown): string {
  const position = /position (\d+)/.exec((error as Error).message)?.[1];
  if (position === undefined || (error as Error).message.includes("line ")) return "";
  return `, line ${text.slice(0, Number(position)).split("\n").length}`;
}
