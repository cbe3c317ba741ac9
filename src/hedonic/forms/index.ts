/** The forms that an attribute can take. */
import type { AttributeForm } from "../../domain/priceModel.ts";
import { choice } from "./choice.ts";
import type { AttributeFormRule } from "./form.ts";
import { line } from "./line.ts";
import { ln } from "./ln.ts";
import { spline } from "./spline.ts";
import { yesNo } from "./yesNo.ts";

export const FORMS: Readonly<Record<AttributeForm, AttributeFormRule>> = { line, ln, spline, choice, yesNo };
