/**
 * Shapes that the computing rooms share. X is n × p without the intercept; groups tie columns to attributes, so that a
 * choice moves as one attribute. Made by buildDesign and fitColumns; read by valuation and explanation.
 */

import type { AttributeForm, ChoiceReading, ResponseForm } from "../domain/priceModel.ts";
import type { Moments } from "../numerics/accumulateMoments.ts";
import type { Column } from "../numerics/column.ts";
import type { LeastSquaresSolution } from "../numerics/solveLeastSquares.ts";
import type { KnownValue } from "./forms/form.ts";

export interface DesignColumn {
  /** Attribute key, CHANNEL_KEY or MARKET_KEY. */
  readonly attribute: string;
  /** Level of a choice ("yes" for yes/no), null for numbers. */
  readonly level: string | null;
  /** n values in the form's own scale (ln already taken; built → age in years; market → months from the first sale). */
  readonly values: Column;
  readonly mean: number;
}

export interface AttributeGroup {
  readonly key: string;
  readonly label: string;
  readonly form: AttributeForm;
  readonly unit: string | null;
  readonly decimals: number;
  /** One step on the column's own scale, the one that coefficients are read at: 1000 for hours, ln 1.1 for a ln form, 1 for a choice. */
  readonly step: number;
  /** The step in words: "1,000 h", "10 % more", "12 months"; null for choice and yes/no, whose words depend on the level. */
  readonly stepWords: string | null;
  /** Indexes into Design.columns. */
  readonly columns: readonly number[];
  /** Choice: reference level. */
  readonly reference: string | null;
  readonly isMarket: boolean;
  /** Numbers: n raw values, for spreads, reach and typical values; null for choices, yes/no and products. */
  readonly stored: Float64Array | null;
  /** A value of the subject on the group's columns; market movement takes a day number, blends and products are made of members. */
  readonly numbersAt: (value: KnownValue) => number[];
  /** Curve: where the pieces meet; empty otherwise. */
  readonly knots: readonly number[];
  /** Choice: levels taken together, and what they are called then. */
  readonly merged: { readonly name: string; readonly levels: readonly string[] } | null;
  readonly reading: ChoiceReading;
  /** A product of two attributes, which stands only while both are in the model. */
  readonly product: { readonly a: string; readonly b: string } | null;
  /** A blend of attributes, which needs all of them known. */
  readonly blend: {
    readonly members: readonly string[];
    readonly at: (values: ReadonlyMap<string, number>) => number;
  } | null;
}

/** Everything of the reference set, included or not; column order is the order of the model, market last. */
export interface Design {
  readonly n: number;
  /** n indexes into the SaleColumns the design was built from, in the design's own row order (sold on, then id). */
  readonly rows: Int32Array;
  readonly responseForm: ResponseForm;
  /** n responses: price or ln price. */
  readonly response: Float64Array;
  /** n prices in major units. */
  readonly prices: Float64Array;
  readonly soldOn: Float64Array;
  readonly columns: readonly DesignColumn[];
  readonly groups: readonly AttributeGroup[];
  /** Moments of [...columns, response]. */
  readonly moments: Moments;
  /** n weights (recency), or null when every sale counts alike. */
  readonly weights: Float64Array | null;
  /** What was done that nobody asked for by name, each a sentence. */
  readonly notes: readonly string[];
}

/**
 * Every estimator comes down to this: weights for the sales and penalties for the columns, with which least squares gives
 * its coefficients. So ledger, built-up and pull hold for all of them, at these weights and penalties.
 */
export interface FitRule {
  readonly weights: Float64Array | null;
  /** One per column of the design, in raw units; null = none. */
  readonly penalty: Float64Array | null;
}

/** A fit of some groups of a design. */
export interface Fit {
  readonly design: Design;
  readonly groups: readonly AttributeGroup[];
  /** Design column indexes in the order of solution.slopes. */
  readonly columns: readonly number[];
  readonly rule: FitRule;
  readonly solution: LeastSquaresSolution;
  readonly leverages: Float64Array;
  /** HC3 standard errors of the slopes; null when leverage 1 or no residual df forbids them. */
  readonly hc3StandardErrors: Float64Array | null;
  readonly hc3InterceptStandardError: number | null;
}

/** The subject on the design's columns: NaN where not known. */
export interface SubjectRow {
  readonly x: Float64Array;
  readonly notKnown: readonly string[];
}
