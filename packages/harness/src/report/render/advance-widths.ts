/**
 * Widths of text in a TrueType font, from its `cmap` (format 4) and `hmtx` tables (OpenType specification 1.9). Kerning is left out: it
 * moves labels by less than a pixel.
 */
export class AdvanceWidths {
  readonly #advances: Map<number, number>;
  readonly #missing: number;

  constructor(font: Uint8Array) {
    const view = new DataView(font.buffer, font.byteOffset, font.byteLength);
    const tables = tableOffsets(view);
    const table = (tag: string): number => {
      const offset = tables.get(tag);
      if (offset === undefined) throw new RangeError(`font: must have a table ${tag}`);
      return offset;
    };
    const unitsPerEm = view.getUint16(table("head") + 18);
    const metricCount = view.getUint16(table("hhea") + 34);
    const hmtx = table("hmtx");
    const advanceOf = (glyph: number): number =>
      view.getUint16(hmtx + 4 * Math.min(glyph, metricCount - 1)) / unitsPerEm;
    this.#missing = advanceOf(0);
    this.#advances = new Map();
    for (const [character, glyph] of glyphs(view, table("cmap")))
      this.#advances.set(character, advanceOf(glyph));
  }

  /** Width of `text` in em. */
  width(text: string): number {
    let width = 0;
    for (const character of text) width += this.#advances.get(character.codePointAt(0) ?? 0) ?? this.#missing;
    return width;
  }
}

function tableOffsets(view: DataView): Map<string, number> {
  const offsets = new Map<string, number>();
  const count = view.getUint16(4);
  for (let index = 0; index < count; index++) {
    const record = 12 + 16 * index;
    const tag = String.fromCharCode(...[0, 1, 2, 3].map((byte) => view.getUint8(record + byte)));
    offsets.set(tag, view.getUint32(record + 8));
  }
  return offsets;
}

/** Pairs of character and glyph in the basic plane. */
function* glyphs(view: DataView, cmap: number): Generator<[number, number]> {
  const count = view.getUint16(cmap + 2);
  for (let index = 0; index < count; index++) {
    const subtable = cmap + view.getUint32(cmap + 4 + 8 * index + 4);
    if (view.getUint16(subtable) !== 4) continue;
    const segments = view.getUint16(subtable + 6) / 2;
    const ends = subtable + 14;
    const starts = ends + 2 * segments + 2;
    const deltas = starts + 2 * segments;
    const ranges = deltas + 2 * segments;
    for (let segment = 0; segment < segments; segment++) {
      const end = view.getUint16(ends + 2 * segment);
      const start = view.getUint16(starts + 2 * segment);
      const delta = view.getUint16(deltas + 2 * segment);
      const range = view.getUint16(ranges + 2 * segment);
      for (let character = start; character <= end && character < 0xffff; character++) {
        const place = ranges + 2 * segment + range + 2 * (character - start);
        const listed = range === 0 ? character : view.getUint16(place);
        if (range === 0 || listed !== 0) yield [character, (listed + delta) & 0xffff];
      }
    }
    return;
  }
}
