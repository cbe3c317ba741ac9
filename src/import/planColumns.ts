/** Which cell of a row means what, settled once for a file before its rows are read. */
import { type Attribute, keyOf, plainAttribute } from "../domain/attribute.ts";
import { AppError } from "../domain/errors.ts";
import type { ColumnMatch, ColumnTarget } from "../domain/importRecord.ts";
import { unitName, unitRatio } from "./conversions/unit.ts";
import { headingParts } from "./headingParts.ts";
import type { RawTable } from "./rawTable.ts";
import { readNumber } from "./readNumber.ts";
import { splitUnit } from "./splitUnit.ts";

export interface AttributeColumn {
  readonly index: number;
  readonly heading: string;
  readonly attribute: Attribute;
  /** Attribute's unit per unit of the heading: 1 where they agree or the heading has none. */
  readonly ratio: number;
  /** Cells of this column name several units, so that one without a unit says too little. Middle value in attribute's units. */
  readonly mixedUnits: { readonly units: readonly string[]; readonly middle: number } | null;
  /** Level by its lower-case spelling; new ones are added where the list is open. */
  readonly levels: Map<string, string>;
  readonly levelsOpen: boolean;
}

type PlainTarget = Exclude<ColumnTarget["to"], "attribute" | "newAttribute" | "nothing">;

export interface Plan {
  readonly attributes: readonly AttributeColumn[];
  /** Column of each plain target; titles and notes may have several. */
  readonly plain: Readonly<Partial<Record<PlainTarget, readonly { index: number; heading: string }[]>>>;
  /** A maker's column, put before a title that does not name the maker. */
  readonly makerIndex: number | null;
  /** What was converted, each a sentence. */
  readonly notes: readonly string[];
}

const MAKER = new Set(["make", "maker", "brand", "manufacturer", "builder", "marque", "hersteller", "marke"]);

function provisional(target: Extract<ColumnTarget, { to: "newAttribute" }>, key: string): Attribute {
  return plainAttribute({
    key,
    label: target.label,
    kind: target.kind,
    unit: target.unit,
  });
}

function attributeOf(
  target: ColumnTarget,
  attributes: readonly Attribute[],
  taken: ReadonlySet<string>,
): Attribute | null {
  if (target.to === "attribute") {
    const found = attributes.find(({ key }) => key === target.key);
    if (found !== undefined) return found;
    throw new AppError({
      family: "import",
      code: "no-such-attribute",
      what: `The class has no attribute "${target.key}".`,
      where: "column match",
      whatToDo: "Choose another attribute for the column, or add this one to the class.",
    });
  }
  if (target.to !== "newAttribute") return null;
  const label = target.label.trim().toLowerCase();
  const known = attributes.find((attribute) => attribute.label.trim().toLowerCase() === label);
  if (known !== undefined) return known;
  let key = keyOf(target.label);
  for (let k = 2; taken.has(key); k++) key = `${keyOf(target.label)}_${k}`;
  return provisional(target, key);
}

/** Units that the cells of a number column name themselves, when there are several; null otherwise. */
function mixedUnitsOf(table: RawTable, index: number, unit: string | null): AttributeColumn["mixedUnits"] {
  if (unit === null) return null;
  const units = new Set<string>();
  const values: number[] = [];
  for (const { cells } of table.rows) {
    const cell = cells[index];
    if (cell === undefined || cell === "") continue;
    const last = cell.charCodeAt(cell.length - 1);
    if (last >= 48 && last <= 57) continue;
    const parts = splitUnit(cell.trim());
    const name = parts === null ? null : unitName(parts.unit);
    const ratio = name === null ? null : unitRatio(name, unit);
    if (name === null || ratio === null) continue;
    units.add(name);
    const number = readNumber(parts!.number, table.options);
    if (number.ok) values.push(number.value * ratio);
  }
  if (units.size < 2) return null;
  values.sort((a, b) => a - b);
  return { units: [...units].sort(), middle: values[values.length >> 1] ?? 1 };
}

function ratioOf(heading: string, attribute: Attribute, notes: string[]): number {
  const unit = headingParts(heading).unit;
  if (unit === null || attribute.kind !== "number" || attribute.unit === null) return 1;
  const ratio = unitRatio(unit, attribute.unit);
  if (ratio === null || ratio === 1) return 1;
  const shown = Number(ratio.toPrecision(5));
  notes.push(
    `${heading}: ${unit} in the file, ${attribute.unit} in the class; converted with 1 ${unit} = ${shown} ${attribute.unit}.`,
  );
  return ratio;
}

function refuseTwice(heading: string, what: string): never {
  throw new AppError({
    family: "import",
    code: "column-twice",
    what: `Two columns are matched to ${what}; the second one is "${heading}".`,
    where: "column match",
    whatToDo: "Match one of them to something else.",
  });
}

/**
 * Refuses (AppError) a match that names a column the file has not, an attribute the class has not, or one thing twice.
 * Titles and notes may be made of several columns.
 */
export function planColumns(
  table: RawTable,
  match: ColumnMatch,
  assetClass: { readonly attributes: readonly Attribute[]; readonly levelsOpen?: boolean },
): Plan {
  const attributes: AttributeColumn[] = [];
  const plain: Partial<Record<PlainTarget, { index: number; heading: string }[]>> = {};
  const notes: string[] = [];
  const taken = new Set(assetClass.attributes.map(({ key }) => key));
  const used = new Set<string>();
  let makerIndex: number | null = null;
  for (const { heading, target } of match.columns) {
    if (target.to === "nothing") continue;
    const index = table.headings.indexOf(heading);
    if (index < 0) {
      throw new AppError({
        family: "import",
        code: "no-such-column",
        what: `The file has no column "${heading}".`,
        where: "column match",
        whatToDo: "Match the columns of this file anew.",
      });
    }
    const attribute = attributeOf(target, assetClass.attributes, taken);
    if (attribute === null) {
      const to = target.to as PlainTarget;
      const columns = plain[to] ?? [];
      plain[to] = columns;
      if (columns.length > 0 && to !== "title" && to !== "notes") refuseTwice(heading, `"${to}"`);
      columns.push({ index, heading });
      continue;
    }
    if (used.has(attribute.key)) refuseTwice(heading, attribute.label);
    used.add(attribute.key);
    taken.add(attribute.key);
    if (MAKER.has(headingParts(heading).name)) makerIndex = index;
    attributes.push({
      index,
      heading,
      attribute,
      ratio: ratioOf(heading, attribute, notes),
      mixedUnits: attribute.kind === "number" ? mixedUnitsOf(table, index, attribute.unit) : null,
      levels: new Map(attribute.levels.map((level) => [level.toLowerCase(), level])),
      levelsOpen: assetClass.levelsOpen === true || attribute.levels.length === 0,
    });
  }
  return { attributes, plain, makerIndex, notes };
}
