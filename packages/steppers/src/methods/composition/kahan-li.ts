import type { Composition } from "../method.ts";

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order conditions, middle weight from
 * consistency; largest change 2.6e-27; free parameters: 1.
 */
export const kahanLi6: Composition = {
  id: "kahan-li-6",
  title: "Kahan–Li 6",
  order: 6,
  source:
    "W. Kahan, R.-C. Li, Math. Comp. 66 (1997) 1089-1099; E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. V.3.2",
  factors: `
    0.3921614440073141392792505574226714038049 0.3325991367893594385997486375000496468816
    -0.7062461725576393598099648195492564593955 0.08221359629355080023149044810205633110329
    0.7985439909348299633989503530489581552114
  `,
};

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order conditions, middle weight from
 * consistency; largest change 4.3e-27; free parameters: 1.
 */
export const kahanLi8: Composition = {
  id: "kahan-li-8",
  title: "Kahan–Li 8",
  order: 8,
  source:
    "W. Kahan, R.-C. Li, Math. Comp. 66 (1997) 1089-1099; E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. V.3.2",
  factors: `
    0.1302024830888900808788176320967005223572 0.5611629817751083845619644077001505672662
    -0.3894749626448472864080785982352483888361 0.1588419065551556008962107457071524814121
    -0.3959038941332375773362315393479389360268 0.1845396409783157070918325415333754628190
    0.2583743876863220472939791099949394718131 0.2950117236093102988709662402182281129765
    -0.6055085338300345116989210793347185875626
  `,
};
