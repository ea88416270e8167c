import { createRequire } from "node:module";
import { fileURLToPath } from "node:url";

const require = createRequire(import.meta.url);

/** The bundled open fonts: labels render where the machine has none. */
export const regularFontFile: string = require.resolve("dejavu-fonts-ttf/ttf/DejaVuSans.ttf");
export const boldFontFile: string = require.resolve("dejavu-fonts-ttf/ttf/DejaVuSans-Bold.ttf");

/** The charting runtime as one script for browsers. */
export const runtimeFile: string = fileURLToPath(new URL("./vega.min.js", import.meta.resolve("vega")));
