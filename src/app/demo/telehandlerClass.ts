/** The invented class of telehandlers and its subject. */
import type { NewAssetClass } from "../../domain/assetClass.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";
import { built, choice, number, yesNo } from "./demoAttribute.ts";
import { MAKES, SERVICE_RECORDS } from "./telehandlerMarket.ts";

export const TELEHANDLER_CLASS: NewAssetClass = {
  name: "Telehandlers",
  itemWord: "machine",
  currencyCode: "EUR",
  priceBasis: { premium: "in", tax: "out" },
  invented: true,
  attributes: [
    built("built", "Age", 40),
    number("hours", "Hours", "h", { step: 1000, lowest: 0, highest: 40_000, expectedDirection: "down" }),
    number("lift_height", "Lift height", "m", { lowest: 3, highest: 30, expectedDirection: "up", decimals: 1 }),
    number("capacity", "Capacity", "t", { lowest: 1, highest: 10, expectedDirection: "up", decimals: 1 }),
    number("power_kw", "Power (kW)", "kW", { step: 10, lowest: 20, highest: 300, expectedDirection: "up" }),
    number("power_hp", "Power (hp)", "hp", {
      step: 10,
      lowest: 25,
      highest: 400,
      expectedDirection: "up",
      decimals: 1,
    }),
    choice("make", "Make", MAKES),
    choice(
      "service_record",
      "Service record",
      SERVICE_RECORDS,
      "Full: every service stamped. Part: gaps. None: no book.",
    ),
    number("tyres_left", "Tyres left", "%", { step: 10, lowest: 0, highest: 100, expectedDirection: "up" }),
    yesNo("air_conditioning", "Air conditioning"),
    yesNo("coupler", "Coupler"),
  ],
};

export const TELEHANDLER_SUBJECT: Subject = {
  title: "Tessaly TH-740",
  serial: "TS740-18-03117",
  identifiedBy: "plate read and photographed",
  values: {
    built: "2018-03-15",
    hours: 4200,
    lift_height: 7,
    capacity: 4,
    power_kw: 97,
    power_hp: 130.077,
    make: "Tessaly",
    service_record: null,
    tyres_left: 60,
    air_conditioning: true,
    coupler: true,
    [CHANNEL_KEY]: "auction",
  },
  effectiveOn: "2026-05-29",
};

export const TELEHANDLER_ENGAGEMENT: Engagement = {
  client: "Harrow Vale Plant Hire (invented)",
  intendedUsers: "the client and its bank",
  intendedUse: "sale of one machine",
  interest: "full ownership, free of finance",
  basisOfValue: "market value",
  basisDefinition: "",
  premise: "removed from site, sold singly",
  marketLevel: "auction, to the end user",
  priceBasisWords: "buyer's premium in, tax out",
  inspected: "seen and started, 28 May 2026; not driven under load",
  reportOn: "2026-06-02",
  exposureTime: "four to eight weeks",
  earlierSales: "none known in the last three years",
  equipment: "pallet forks, hydraulic coupler",
  practice: "Ansell & Thorley (invented)",
  practiceLine: "Valuers of machines and plant · 4 Quarry Rise, Marrowby",
  valuer: "",
  ownCaveats: [],
};
