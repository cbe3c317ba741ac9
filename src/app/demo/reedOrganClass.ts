/** The invented class of reed organs and its subject. */
import type { NewAssetClass } from "../../domain/assetClass.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";
import { built, choice, number, yesNo } from "./demoAttribute.ts";
import { ORGAN_CASES, ORGAN_MAKERS } from "./reedOrgans.ts";

export const REED_ORGAN_CLASS: NewAssetClass = {
  name: "Reed organs",
  itemWord: "organ",
  currencyCode: "GBP",
  priceBasis: { premium: "none", tax: "in" },
  invented: true,
  attributes: [
    { ...built("built", "Age", 250), step: 10, expectedDirection: null },
    number("stops", "Stops", null, { lowest: 0, highest: 60, expectedDirection: "up" }),
    number("ranks", "Ranks", null, { lowest: 1, highest: 20, expectedDirection: "up" }),
    number("height", "Height", "cm", { step: 10, lowest: 40, highest: 400 }),
    choice("maker", "Maker", ORGAN_MAKERS),
    choice("case", "Case", ORGAN_CASES),
    yesNo("pedals", "Pedals"),
    yesNo("restored", "Restored"),
  ],
};

export const REED_ORGAN_SUBJECT: Subject = {
  title: "Aldenby 3-rank parlour organ",
  serial: null,
  identifiedBy: "maker's label inside the lid",
  values: {
    built: "1889-07-01",
    stops: 11,
    ranks: 3,
    height: 112,
    maker: "Aldenby",
    case: "carved",
    pedals: false,
    restored: null,
    [CHANNEL_KEY]: "auction",
  },
  effectiveOn: "2026-05-29",
};

export const REED_ORGAN_ENGAGEMENT: Engagement = {
  client: "the trustees of Fenwick Chapel (invented)",
  intendedUsers: "the client",
  intendedUse: "insurance of contents",
  interest: "full ownership",
  basisOfValue: "market value",
  basisDefinition: "",
  premise: "removed, sold singly",
  marketLevel: "auction",
  priceBasisWords: "no premium, tax in",
  inspected: "seen and played, 27 May 2026",
  reportOn: "2026-06-02",
  exposureTime: "three months",
  earlierSales: "none known",
  equipment: "",
  practice: "Ansell & Thorley (invented)",
  practiceLine: "Valuers of machines, plant and instruments · 4 Quarry Rise, Marrowby",
  valuer: "",
  ownCaveats: [],
};
