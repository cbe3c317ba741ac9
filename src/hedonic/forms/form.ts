/**
 * A form turns an attribute's stored values into columns of the design, and a subject's value into the same columns.
 * Members share one signature, so that a design takes any of them.
 */

import type { Attribute, AttributeValue } from "../../domain/attribute.ts";
import type { Column } from "../../numerics/column.ts";

export interface FormSource {
  readonly label: string;
  /** Null for the channel, which is an attribute of the sale itself. */
  readonly attribute: Attribute | null;
  /** n stored values in design row order; age in years already taken for built. Choices: level index. */
  readonly stored: Float64Array;
  readonly levels: readonly string[];
  /** Choice: the stated reference level, or null for the most frequent one. */
  readonly reference: string | null;
}

export interface FormColumns {
  readonly columns: readonly { readonly level: string | null; readonly values: Column }[];
  readonly reference: string | null;
  /** One step on the column's scale, and in words; null words where they depend on the level. */
  readonly step: number;
  readonly stepWords: string | null;
  readonly unit: string | null;
}

export interface AttributeFormRule {
  readonly label: string;
  readonly columns: (source: FormSource) => FormColumns;
  /** The subject's value on each of the columns; a number for number and built (age), a level, a yes/no. */
  readonly subject: (value: Exclude<AttributeValue, null>, made: FormColumns) => number[];
}
