import { renderAsync } from "@resvg/resvg-js";
import { boldFontFile, regularFontFile } from "./font-files.ts";

/** Pixels per unit of the drawing: sharp on paper. */
const SCALE = 2;

/** A drawing as PNG, with the bundled font and no other; drawn beside the main thread. */
export async function toPng(svg: string): Promise<Uint8Array> {
  const picture = await renderAsync(svg, {
    fitTo: { mode: "zoom", value: SCALE },
    font: {
      loadSystemFonts: false,
      fontFiles: [regularFontFile, boldFontFile],
      defaultFontFamily: "DejaVu Sans",
    },
  });
  return picture.asPng();
}
