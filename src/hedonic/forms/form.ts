/**
 * A form turns an attribute's stored values into columns of the design, and a value of the subject into the same columns.
 * Members share one signature, so that a design takes any of them.
 */
import type { Attribute, AttributeValue } from "../../domain/attribute.ts";
import type { ModelAttribute } from "../../domain/priceModel.ts";
import type { Column } from "../../numerics/column.ts";

export interface FormSource {
  readonly label: string;
  /** Null for the channel, which is an attribute of the sale itself. */
  readonly attribute: Attribute | null;
  /** n stored values in design row order; age in years already taken for built. Choices: level index. */
  readonly stored: Float64Array;
  readonly levels: readonly string[];
  /** Reference level, knots, rare levels: as the model states them. */
  readonly wanted: ModelAttribute;
}

export type KnownValue = Exclude<AttributeValue, null>;

export interface FormColumns {
  readonly columns: readonly { readonly level: string | null; readonly values: Column }[];
  /** Choice: the level that the others are read against; null for numbers, and where levels are drawn together. */
  readonly reference: string | null;
  /** One step on the column's scale, and in words; null words where they depend on the level. */
  readonly step: number;
  readonly stepWords: string | null;
  readonly unit: string | null;
  /** The subject's value on the columns: a number for number and built (age), a level, a yes/no. */
  readonly numbersAt: (value: KnownValue) => number[];
  /** Choice: what the levels that were merged are called together, and which they are. */
  readonly merged: { readonly name: string; readonly levels: readonly string[] } | null;
  /** Curve: where the pieces meet. */
  readonly knots: readonly number[];
  /** What was done that nobody asked for by name, each a sentence. */
  readonly notes: readonly string[];
}

export interface AttributeFormRule {
  readonly label: string;
  readonly columns: (source: FormSource) => FormColumns;
}

/** What most forms have nothing of. */
export const PLAIN = { merged: null, knots: [], notes: [] } as const;
