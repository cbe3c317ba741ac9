/** What a new subject and a new engagement start as: nothing known, nothing stated. */
import type { Settings } from "../../contract/requests.ts";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import type { Day } from "../../domain/day.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";

/** The calendar day here and now. */
export function today(now: Date = new Date()): Day {
  const two = (part: number): string => String(part).padStart(2, "0");
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

export function blankSubject(effectiveOn: Day): Subject {
  return { title: "", serial: null, identifiedBy: null, values: {}, effectiveOn };
}

/** True while not one attribute of the item is known: there is nothing to price yet. */
export function isBlank(subject: Subject): boolean {
  return Object.entries(subject.values).every(([key, value]) => key === CHANNEL_KEY || value === null);
}

export function blankEngagement(settings: Settings, reportOn: Day): Engagement {
  return {
    client: "",
    intendedUsers: "",
    intendedUse: "",
    interest: "",
    basisOfValue: "",
    basisDefinition: "",
    premise: "",
    marketLevel: "",
    priceBasisWords: "",
    inspected: "",
    reportOn,
    exposureTime: "",
    earlierSales: "",
    equipment: "",
    practice: settings.practice,
    practiceLine: settings.practiceLine,
    valuer: [settings.person, settings.credentials].filter((part) => part !== "").join(", "),
    ownCaveats: [],
  };
}
