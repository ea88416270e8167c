import { Resvg } from "@resvg/resvg-js";
import { boldFontFile, regularFontFile } from "./font-files.ts";

/** Pixels per unit of the drawing: sharp on paper. */
const SCALE = 2;

/** A drawing as PNG, with the bundled font and no other. */
export function toPng(svg: string): Uint8Array {
  return new Resvg(svg, {
    fitTo: { mode: "zoom", value: SCALE },
    font: {
      loadSystemFonts: false,
      fontFiles: [regularFontFile, boldFontFile],
      defaultFontFamily: "DejaVu Sans",
    },
  })
    .render()
    .asPng();
}
