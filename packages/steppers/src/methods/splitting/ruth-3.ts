import type { Splitting } from "../method.ts";

export const ruth3: Splitting = {
  id: "ruth-3",
  title: "Ruth 3",
  order: 3,
  source: "R.D. Ruth, IEEE Trans. Nucl. Sci. NS-30 (1983) 2669-2671",
  first: "kick",
  symmetric: false,
  weights: "7/24 2/3 3/4 -2/3 -1/24 1",
};
