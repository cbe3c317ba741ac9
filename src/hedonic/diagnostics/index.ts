/** The checks of a fit. */
import { bends } from "./bends.ts";
import { collinearity } from "./collinearity.ts";
import { curvature } from "./curvature.ts";
import type { Diagnostic } from "./diagnostic.ts";
import { drift } from "./drift.ts";
import { forecast } from "./forecast.ts";
import { influence } from "./influence.ts";
import { order } from "./order.ts";
import { outlier } from "./outlier.ts";
import { shape } from "./shape.ts";
import { spread, spreadWithPrice } from "./spread.ts";
import { tails } from "./tails.ts";

export const DIAGNOSTICS: readonly Diagnostic[] = [
  spread,
  spreadWithPrice,
  shape,
  tails,
  curvature,
  bends,
  order,
  forecast,
  drift,
  outlier,
  influence,
  collinearity,
];
