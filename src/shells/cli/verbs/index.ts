/** All verbs, in the order of the help. */
import type { Verb } from "../verb.ts";
import { compareVerb } from "./compare.ts";
import { demoVerb } from "./demo.ts";
import { digitsVerb } from "./digits.ts";
import { healthVerb } from "./health.ts";
import { importVerb } from "./import.ts";
import { lotVerb } from "./lot.ts";
import { priceVerb } from "./price.ts";
import { refitVerb } from "./refit.ts";
import { serveVerb } from "./serve.ts";
import { setsVerb } from "./sets.ts";
import { sheetVerb } from "./sheet.ts";
import { tryVerb } from "./try.ts";
import { verifyVerb } from "./verify.ts";

export const VERBS: readonly Verb[] = [
  tryVerb,
  importVerb,
  refitVerb,
  priceVerb,
  lotVerb,
  setsVerb,
  compareVerb,
  healthVerb,
  sheetVerb,
  verifyVerb,
  serveVerb,
  demoVerb,
  digitsVerb,
];
