/** A layer of marks that are not seen and only carry tooltips: drawings, which have none, do without. */
export const HOVER_MARKS = "hover_marks";

/** A layer of small grey marks that tooltips need most: the page's drawings do without to save their bytes. */
export const MUTED_MARKS = "muted_marks";
