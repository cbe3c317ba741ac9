/**
 * The demo: two invented asset classes of different kinds, with the files their sales come from, what a person did with the
 * sales afterwards, and a subject for each. Everything in it is invented.
 */
import type { NewAssetClass } from "../../domain/assetClass.ts";
import { keyOf } from "../../domain/attribute.ts";
import type { Day } from "../../domain/day.ts";
import type { ColumnMatch, ColumnTarget } from "../../domain/importRecord.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";
import { drawFrom } from "./random.ts";
import { REED_ORGAN_CLASS, REED_ORGAN_ENGAGEMENT, REED_ORGAN_SUBJECT } from "./reedOrganClass.ts";
import { REED_ORGAN_HEADINGS, reedOrganFile } from "./reedOrgans.ts";
import { TELEHANDLER_CLASS, TELEHANDLER_ENGAGEMENT, TELEHANDLER_SUBJECT } from "./telehandlerClass.ts";
import {
  type DemoSale,
  TELEHANDLER_HEADINGS,
  telehandlerFile,
  telehandlerSales,
  telehandlerSetAside,
} from "./telehandlers.ts";
import { WEEKLY_FILE_NAME, weeklyFile } from "./weeklyFile.ts";

export interface DemoClass {
  readonly assetClass: NewAssetClass;
  readonly fileName: string;
  readonly bytes: Uint8Array;
  readonly match: ColumnMatch;
  /** Sales by reference; references are unique in the demo. */
  readonly setAside: readonly {
    readonly reference: string;
    readonly reason: string;
    readonly by: string;
    readonly on: Day;
  }[];
  readonly verify: readonly {
    readonly reference: string;
    readonly how: string;
    readonly by: string;
    readonly on: Day;
  }[];
  readonly subject: Subject;
  readonly engagement: Engagement;
}

/** A demo class as it is opened: its file, and what was done with the sales afterwards. */
export interface OpenableDemo extends Pick<DemoClass, "assetClass" | "fileName" | "bytes" | "match"> {
  readonly marks: Pick<DemoClass, "setAside" | "verify" | "subject" | "engagement">;
}

function matchOf(
  headings: readonly string[],
  assetClass: NewAssetClass,
  others: Readonly<Record<string, ColumnTarget["to"]>>,
  source: string,
): ColumnMatch {
  const attributeAt = (heading: string): ColumnTarget => {
    const name = heading.replace(/ \([^)]*\)$/, "");
    const found = assetClass.attributes.find(
      ({ key, label }) => [heading, name].includes(label) || key === keyOf(name),
    );
    return found === undefined ? { to: "nothing" } : { to: "attribute", key: found.key };
  };
  return {
    columns: headings.map((heading) => {
      const to = others[heading];
      return { heading, target: to === undefined ? attributeAt(heading) : ({ to } as ColumnTarget) };
    }),
    fixed: {
      soldOn: null,
      currencyCode: assetClass.currencyCode,
      channel: "auction",
      source,
      priceBasis: assetClass.priceBasis,
    },
  };
}

/** Two thirds of the sales that hold, by two invented people. */
function verified(sales: readonly DemoSale[]): DemoClass["verify"] {
  const draw = drawFrom(31_415);
  return sales
    .filter(({ cells, channel }) => channel !== "asking" && cells.Notes === "" && draw.chance(0.68))
    .map(({ cells }) => ({
      reference: cells.Lot,
      how: draw.pick(["hammer list", "photos", "invoice", "call"]),
      by: draw.pick(["M. Ansell", "J. Thorley"]),
      on: DEMO_DAY,
    }));
}

/** The day on which the demo's people did their work. */
export const DEMO_DAY: Day = "2026-06-01";

function telehandlers(): DemoClass {
  const sales = telehandlerSales();
  const others = {
    Lot: "reference",
    "Sold on": "soldOn",
    Machine: "title",
    "Sold through": "channel",
    Price: "price",
    Currency: "currency",
    Source: "source",
    Notes: "notes",
  } as const;
  return {
    assetClass: TELEHANDLER_CLASS,
    fileName: "telehandlers.csv",
    bytes: telehandlerFile(),
    match: matchOf(TELEHANDLER_HEADINGS, TELEHANDLER_CLASS, others, "invented sales"),
    setAside: telehandlerSetAside(sales).map((each) => ({ ...each, by: "M. Ansell", on: DEMO_DAY })),
    verify: verified(sales),
    subject: TELEHANDLER_SUBJECT,
    engagement: TELEHANDLER_ENGAGEMENT,
  };
}

function reedOrgans(): DemoClass {
  const others = {
    Ref: "reference",
    "Date sold": "soldOn",
    Instrument: "title",
    Channel: "channel",
    "Sold for": "price",
    Remarks: "notes",
  } as const;
  return {
    assetClass: REED_ORGAN_CLASS,
    fileName: "reed-organs.csv",
    bytes: reedOrganFile(),
    match: matchOf(REED_ORGAN_HEADINGS, REED_ORGAN_CLASS, others, "invented sales"),
    setAside: [],
    verify: [],
    subject: REED_ORGAN_SUBJECT,
    engagement: REED_ORGAN_ENGAGEMENT,
  };
}

/** The first is the one that opens. */
export function demoClasses(): readonly DemoClass[] {
  return [telehandlers(), reedOrgans()];
}

/** For openDemo. */
export function openableDemos(): readonly OpenableDemo[] {
  return demoClasses().map((demo) => ({ ...demo, marks: demo }));
}

/** A week's list to bring into the telehandlers, for trying the import out. */
export function demoWeeklyFile(): { readonly fileName: string; readonly bytes: Uint8Array } {
  return { fileName: WEEKLY_FILE_NAME, bytes: weeklyFile(telehandlerSales()) };
}
