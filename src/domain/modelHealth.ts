/** What a reviewer asks of a price model beside its ledger, as plain data: checks, the response's power, the market's path. */
import type { Day } from "./day.ts";
import type { Diagnosis, FitDiagnoses } from "./diagnosis.ts";
import type { ResponseForm } from "./priceModel.ts";

export interface NamedSale {
  readonly sale: number;
  readonly reference: string | null;
  readonly title: string;
}

export interface HealthCheck extends Omit<Diagnosis, "sales"> {
  /** Sales concerned, the worst first. */
  readonly sales: readonly NamedSale[];
}

export interface PowerOfPrice {
  readonly curve: readonly { readonly power: number; readonly logLikelihood: number }[];
  readonly best: number;
  readonly low: number | null;
  readonly high: number | null;
  readonly advised: ResponseForm | null;
  readonly sentence: string;
}

export interface ErrorsInMoney {
  readonly rootMeanSquare: number;
  readonly rootMeanSquareFraction: number;
  readonly medianAbsolute: number;
  readonly medianAbsoluteFraction: number;
}

export interface ResponsesCompared {
  readonly price: ErrorsInMoney;
  readonly lnPrice: ErrorsInMoney;
  readonly better: ResponseForm | null;
  readonly sentence: string;
}

/** Price level against the first period = 100, for items alike. */
export interface IndexPoint {
  /** "2024 Q3" */
  readonly period: string;
  readonly from: Day;
  readonly sales: number;
  /** Nearly unbiased (Kennedy 1981) after ln; the average price as base for a plain price. */
  readonly level: number;
  readonly low95: number;
  readonly high95: number;
}

export interface ModelHealth {
  readonly currencyCode: string;
  readonly saleCount: number;
  readonly checks: readonly HealthCheck[];
  readonly leftOut: FitDiagnoses["leftOut"];
  /** Why power and responses are not there: a price of zero or below, or too many sales to wait for. */
  readonly power: PowerOfPrice | null;
  readonly responses: ResponsesCompared | null;
  /** Empty without market movement in the model. */
  readonly index: readonly IndexPoint[];
  readonly headline: string;
}
