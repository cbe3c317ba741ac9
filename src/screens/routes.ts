/** The places, in the order of the header. A new place is a folder and a line here. */
import type { ComponentType } from "react";
import { AppraisePlace } from "./appraise/AppraisePlace.tsx";
import { AttributesPlace } from "./attributes/AttributesPlace.tsx";
import { JournalPlace } from "./journal/JournalPlace.tsx";
import { PriceModelPlace } from "./priceModel/PriceModelPlace.tsx";
import { SalesPlace } from "./sales/SalesPlace.tsx";
import { SheetsPlace } from "./sheets/SheetsPlace.tsx";
import { StartPlace } from "./start/StartPlace.tsx";

export interface Place {
  readonly path: string;
  readonly label: string;
  readonly component: ComponentType;
  /** Which count of the class stands beside its name. */
  readonly count: "saleCount" | "attributeCount" | "sheetCount" | null;
}

export const PLACES: readonly Place[] = [
  { path: "sales", label: "Sales", component: SalesPlace, count: "saleCount" },
  { path: "attributes", label: "Attributes", component: AttributesPlace, count: "attributeCount" },
  { path: "price-model", label: "Price model", component: PriceModelPlace, count: null },
  { path: "appraise", label: "Appraise", component: AppraisePlace, count: null },
  { path: "sheets", label: "Sheets", component: SheetsPlace, count: "sheetCount" },
  { path: "journal", label: "Journal", component: JournalPlace, count: null },
];

/** The two doors: shown while there is no class, and from the class switcher. Not a place of a class. */
export const START: Place = { path: "start", label: "Start", component: StartPlace, count: null };

export const FIRST_PLACE = "price-model";
