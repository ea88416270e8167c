import { TABLES_AT, TABLES_BYTES } from "./memory-map.ts";

/**
 * Anomaly tables in the lanes' memory, side by side, each once however many lanes use it. Where the next one does not fit, all are
 * dropped: `generation` changes, and the lanes at work ask for theirs again. Sixteen of the largest (e = 0.9999) take a third of the room.
 */
export class TableArena {
  generation = 0;
  private readonly doubles: Float64Array;
  private readonly addresses = new Map<Float64Array, number>();
  private next = TABLES_AT;

  constructor(doubles: Float64Array) {
    this.doubles = doubles;
  }

  /** Address of a table's first row. */
  addressOf(rows: Float64Array): number {
    const known = this.addresses.get(rows);
    if (known !== undefined) return known;
    if (this.next + rows.byteLength > TABLES_AT + TABLES_BYTES) {
      this.addresses.clear();
      this.next = TABLES_AT;
      this.generation += 1;
    }
    const address = this.next;
    this.doubles.set(rows, address / 8);
    this.addresses.set(rows, address);
    this.next += rows.byteLength;
    return address;
  }
}
