/**
 * Units that mean the same kind of quantity, and their exact ratios. Sources: international yard and pound (1959): foot
 * 0.3048 m, mile 1,609.344 m, pound 0.45359237 kg; mechanical horsepower 550 ft·lbf/s = 745.69987158227022 W; metric
 * horsepower 75 kgf·m/s = 735.49875 W; US gallon 231 in³ = 3.785411784 l; imperial gallon 4.54609 l.
 */

type Quantity = "power" | "length" | "distance" | "mass" | "volume" | "time" | "share";

interface Unit {
  readonly name: string;
  readonly quantity: Quantity;
  /** Size in the quantity's base unit: kW, m, km, kg, l, h, 1 %. */
  readonly size: number;
  readonly spellings: readonly string[];
}

const UNITS: readonly Unit[] = [
  { name: "kW", quantity: "power", size: 1, spellings: ["kw", "kilowatt", "kilowatts"] },
  { name: "hp", quantity: "power", size: 0.7456998715822702, spellings: ["hp", "bhp", "horsepower"] },
  { name: "PS", quantity: "power", size: 0.73549875, spellings: ["ps", "pk", "cv", "ch"] },
  { name: "m", quantity: "length", size: 1, spellings: ["m", "metre", "metres", "meter", "meters"] },
  { name: "cm", quantity: "length", size: 0.01, spellings: ["cm"] },
  { name: "mm", quantity: "length", size: 0.001, spellings: ["mm"] },
  { name: "ft", quantity: "length", size: 0.3048, spellings: ["ft", "feet", "foot"] },
  { name: "in", quantity: "length", size: 0.0254, spellings: ["in", "inch", "inches"] },
  { name: "km", quantity: "distance", size: 1, spellings: ["km", "kilometre", "kilometres", "kilometers"] },
  { name: "mi", quantity: "distance", size: 1.609344, spellings: ["mi", "mile", "miles"] },
  { name: "kg", quantity: "mass", size: 1, spellings: ["kg", "kilogram", "kilograms"] },
  { name: "t", quantity: "mass", size: 1000, spellings: ["t", "tonne", "tonnes"] },
  { name: "lb", quantity: "mass", size: 0.45359237, spellings: ["lb", "lbs", "pounds"] },
  { name: "l", quantity: "volume", size: 1, spellings: ["l", "litre", "litres", "liter", "liters"] },
  { name: "US gal", quantity: "volume", size: 3.785411784, spellings: ["us gal", "usgal"] },
  { name: "imp gal", quantity: "volume", size: 4.54609, spellings: ["imp gal", "impgal", "uk gal"] },
  { name: "h", quantity: "time", size: 1, spellings: ["h", "hr", "hrs", "hour", "hours"] },
  { name: "%", quantity: "share", size: 1, spellings: ["%", "percent", "per cent", "pct"] },
];

const BY_SPELLING = new Map(UNITS.flatMap((unit) => unit.spellings.map((spelling) => [spelling, unit] as const)));

/** The unit's usual name ("KW" → "kW"), or null where it is none of ours. */
export function unitName(text: string): string | null {
  return BY_SPELLING.get(text.trim().toLowerCase())?.name ?? null;
}

/** How many of `to` one `from` is: kW → hp 1.3410…; null where they measure different things or are not known. */
export function unitRatio(from: string, to: string): number | null {
  const [a, b] = [BY_SPELLING.get(from.trim().toLowerCase()), BY_SPELLING.get(to.trim().toLowerCase())];
  if (a === undefined || b === undefined || a.quantity !== b.quantity) return null;
  return a === b ? 1 : a.size / b.size;
}
