/**
 * Which column of a file is which: by what was used before, by the class's attributes, by usual names, and last by the values.
 * A proposal: the preview shows it and a person changes it.
 */
import type { Attribute } from "../domain/attribute.ts";
import type { ColumnMatch, ColumnTarget } from "../domain/importRecord.ts";
import { unitRatio } from "./conversions/unit.ts";
import { headingParts, plainWords } from "./headingParts.ts";
import { type ColumnLook, kindOf, lookAtColumn } from "./inferAttribute.ts";
import type { RawTable } from "./rawTable.ts";
import { ATTRIBUTE_SYNONYMS, BUILT_WORDS, SYNONYMS } from "./synonyms.ts";

type Plain = keyof typeof SYNONYMS;

/** What the class says where the file is silent. */
export type ClassDefaults = Pick<ColumnMatch["fixed"], "currencyCode" | "channel" | "source" | "priceBasis">;

export const USUAL_DEFAULTS: ClassDefaults = {
  currencyCode: "EUR",
  channel: "auction",
  source: "",
  priceBasis: { premium: "none", tax: "out" },
};

const NOTHING: ColumnTarget = { to: "nothing" };

class Matcher {
  readonly targets: (ColumnTarget | null)[];
  readonly #headings: readonly string[];

  constructor(headings: readonly string[]) {
    this.#headings = headings;
    this.targets = headings.map(() => null);
  }

  /** Index of the first column that is still free and fits. */
  free(fits: (heading: string, index: number) => boolean): number {
    return this.#headings.findIndex((heading, index) => this.targets[index] === null && fits(heading, index));
  }

  give(index: number, target: ColumnTarget): void {
    if (index >= 0) this.targets[index] = target;
  }

  has(to: Plain): boolean {
    return this.targets.some((target) => target?.to === to);
  }
}

function fromPrevious(
  matcher: Matcher,
  headings: readonly string[],
  previous: ColumnMatch,
  keys: ReadonlySet<string>,
): void {
  const byName = new Map(previous.columns.map(({ heading, target }) => [plainWords(heading), target]));
  headings.forEach((heading, index) => {
    const target = byName.get(plainWords(heading));
    if (target === undefined || (target.to === "attribute" && !keys.has(target.key))) return;
    matcher.give(index, target);
  });
}

/** A heading is an attribute's when whole names agree, or names without units agree and the units can be converted. */
function fitsAttribute(heading: string, attribute: Attribute, synonyms: boolean): boolean {
  const whole = plainWords(heading);
  const own = [plainWords(attribute.label), attribute.key.replaceAll("_", " ")];
  if (own.includes(whole)) return true;
  const { name, unit } = headingParts(heading);
  const label = headingParts(attribute.label);
  const wanted = attribute.unit ?? label.unit;
  if (unit !== null && wanted !== null && unitRatio(unit, wanted) === null && unit !== wanted) return false;
  if (name === label.name || own.includes(name)) return true;
  if (synonyms && attribute.kind === "built" && BUILT_WORDS.includes(name)) return true;
  return synonyms && ATTRIBUTE_SYNONYMS.some((words) => words.includes(name) && words.includes(label.name));
}

function exactUnit(heading: string, attribute: Attribute): boolean {
  const { unit } = headingParts(heading);
  return unit === (attribute.unit ?? headingParts(attribute.label).unit);
}

function fromAttributes(matcher: Matcher, attributes: readonly Attribute[], synonyms: boolean): void {
  const matched = new Set(matcher.targets.map((target) => (target?.to === "attribute" ? target.key : null)));
  const open = attributes.filter(({ key, archived }) => !archived && !matched.has(key));
  for (const sameUnit of [true, false]) {
    for (const attribute of open) {
      if (matched.has(attribute.key)) continue;
      const index = matcher.free(
        (heading) => fitsAttribute(heading, attribute, synonyms) && (!sameUnit || exactUnit(heading, attribute)),
      );
      if (index < 0) continue;
      matched.add(attribute.key);
      matcher.give(index, { to: "attribute", key: attribute.key });
    }
  }
}

function fromUsualNames(matcher: Matcher, looks: (index: number) => ColumnLook): void {
  for (const to of Object.keys(SYNONYMS) as Plain[]) {
    if (matcher.has(to)) continue;
    for (const word of SYNONYMS[to]) {
      const index = matcher.free(
        (heading, k) =>
          (headingParts(heading).name === word || plainWords(heading) === word) && mayBe(to, word, looks(k)),
      );
      if (index < 0) continue;
      matcher.give(index, { to });
      break;
    }
  }
}

/** A name alone is not enough where the values speak against it: "premium: yes" is one, "list: 4" is no source. */
function mayBe(to: Plain, word: string, look: ColumnLook): boolean {
  if (look.filled === 0) return true;
  if (to === "price") return look.numbers > 0 || look.days === 0;
  if (to === "soldOn") return look.days >= 0.5 || (word !== "sold" && word !== "day");
  if (to === "currency" || to === "channel" || to === "source") return look.numbers < 0.5;
  if (to === "title") return look.numbers < 0.9;
  return true;
}

/** A column that could hold prices: numbers above zero, mostly different, in the hundreds or more, and not years. */
function pricelike(look: ColumnLook): boolean {
  if (look.numbers < 0.8 || look.years > 0.5 || look.middle === null || look.lowest === null) return false;
  return look.middle >= 100 && look.distinct * 4 >= look.filled && look.lowest > 0;
}

function newAttributeOf(heading: string, look: ColumnLook): ColumnTarget {
  const { name, unit } = headingParts(heading);
  const namedBuilt = BUILT_WORDS.includes(name);
  const kind = kindOf(look, namedBuilt);
  if (kind === null) return NOTHING;
  const label = heading.replace(/_/g, " ").trim();
  const sentence = label.charAt(0).toUpperCase() + label.slice(1);
  if (kind === "number") return { to: "newAttribute", label: sentence, kind, unit: unit ?? look.unit };
  return { to: "newAttribute", label: sentence, kind, unit: kind === "built" ? "years" : null };
}

/**
 * One target per column. With `previous`, headings seen before keep their target and the fixed values stay. Without attributes
 * (a class about to be made) unmatched columns become new attributes, their kind and unit judged by their values, and the first
 * price-like column of numbers is the price if no heading says so.
 */
export function matchColumns(
  table: RawTable,
  attributes: readonly Attribute[],
  previous: ColumnMatch | null,
  defaults: ClassDefaults = USUAL_DEFAULTS,
): ColumnMatch {
  const { headings } = table;
  const matcher = new Matcher(headings);
  const looked = new Map<number, ColumnLook>();
  const looks = (index: number): ColumnLook => {
    let look = looked.get(index);
    if (look === undefined) {
      look = lookAtColumn(table, index);
      looked.set(index, look);
    }
    return look;
  };
  if (previous !== null) fromPrevious(matcher, headings, previous, new Set(attributes.map(({ key }) => key)));
  fromAttributes(matcher, attributes, false);
  fromUsualNames(matcher, looks);
  fromAttributes(matcher, attributes, true);
  if (attributes.length === 0) {
    if (!matcher.has("soldOn"))
      matcher.give(
        matcher.free((heading, k) => onlyDays(heading, looks(k))),
        { to: "soldOn" },
      );
    if (!matcher.has("price"))
      matcher.give(
        matcher.free((_, k) => pricelike(looks(k))),
        { to: "price" },
      );
    headings.forEach((heading, k) => {
      if (matcher.targets[k] === null) matcher.give(k, newAttributeOf(heading, looks(k)));
    });
  }
  const columns = headings.map((heading, k) => ({ heading, target: matcher.targets[k] ?? NOTHING }));
  return { columns, fixed: previous?.fixed ?? { soldOn: null, ...defaults } };
}

function onlyDays(heading: string, look: ColumnLook): boolean {
  return look.days >= 0.8 && !BUILT_WORDS.includes(headingParts(heading).name);
}
