/** Names of the families that the two attributes which matter most part the marks into, each beside its own cloud. */
import { lowerStart } from "../../domain/format.ts";
import { type Frame, familyOf, type SetMarks, type SetScale } from "./setScale.ts";

interface FamilyNamesProps {
  readonly marks: SetMarks;
  readonly scale: SetScale;
  readonly parting: readonly number[];
  readonly frame: Frame;
  readonly limit: number;
}

interface Cloud {
  readonly xs: number[];
  readonly ys: number[];
}

const LETTER = 6.6;
const MOVES = [0, 12, -12, 24, -24, 36, -36, 48, -48, 60, 72, 84, 96, 110, 125, 140, 160, 180, -60, -72] as const;
/** The marks as `drawSetMarks` draws them, by family. */
const GLYPHS = [
  "M0 -5V5",
  "M0 -3.2V3.2",
  "M2.6 0A2.6 2.6 0 1 1 -2.6 0A2.6 2.6 0 1 1 2.6 0",
  "M-2.4 -2.4L2.4 2.4M-2.4 2.4L2.4 -2.4",
] as const;

export function FamilyNames({ marks, scale, parting, frame, limit }: FamilyNamesProps) {
  if (parting.length === 0) return null;
  const clouds = cloudsOf(marks, scale, parting);
  const lowest = scale.y(limit) + 18;
  const taken: Place[] = [];
  return clouds.flatMap(({ xs, ys }, family) => {
    if (xs.length === 0) return [];
    const text = nameOf(marks, parting, family);
    const wanted = Math.max(lowest, middleOf(ys));
    const place = freePlace(clouds, wanted, lowest, text.length * LETTER, frame, taken);
    if (place === null) return [];
    taken.push(place);
    const side = place.anchor === "end" ? -1 : 1;
    return [
      <g key={text}>
        <path
          d={GLYPHS[family]}
          transform={`translate(${place.x} ${place.y - 4})`}
          className="s-slate f-none"
          strokeWidth="1.4"
        />
        <text
          x={place.x + side * 9}
          y={place.y}
          textAnchor={place.anchor}
          className="halo"
          style={{ font: "italic 400 13px var(--serif)" }}
        >
          {text}
        </text>
      </g>,
    ];
  });
}

function cloudsOf({ price, error }: SetMarks, { x, y }: SetScale, parting: readonly number[]): Cloud[] {
  const clouds: Cloud[] = Array.from({ length: 4 }, () => ({ xs: [], ys: [] }));
  price.forEach((amount, set) => {
    const err = error[set];
    if (amount === null || err === null || err === undefined) return;
    const cloud = clouds[familyOf(set, parting)]!;
    cloud.xs.push(x(amount));
    cloud.ys.push(y(err));
  });
  return clouds;
}

function nameOf({ attributes }: SetMarks, [first, second]: readonly number[], family: number): string {
  const a = lowerStart(attributes[first!]!.label);
  if (second === undefined) return family === 0 ? `${a} in` : `${a} left out`;
  const b = lowerStart(attributes[second]!.label);
  return [`both ${a} and ${b} in`, `${a} in, ${b} left out`, `${b} in, ${a} left out`, `neither ${a} nor ${b}`][
    family
  ]!;
}

function middleOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)]!;
}

interface Place {
  readonly x: number;
  readonly y: number;
  readonly anchor: "start" | "end";
}

/** At either end of the height where no marks and no other name stand, as near to it as can be; null where there is none. */
function freePlace(
  clouds: readonly Cloud[],
  wanted: number,
  lowest: number,
  length: number,
  { left, right, bottom }: Frame,
  taken: readonly Place[],
): Place | null {
  for (const move of MOVES) {
    const y = wanted + move;
    if (y < lowest || y > bottom - 4) continue;
    const near = clouds.flatMap(({ xs, ys }) => xs.filter((_, i) => Math.abs(ys[i]! - (y - 4)) < 13));
    const isFree = (anchor: Place["anchor"]): boolean =>
      taken.every((one) => one.anchor !== anchor || Math.abs(one.y - y) > 17);
    if (isFree("end") && near.every((x) => x < right - length - 26)) return { x: right - 10, y, anchor: "end" };
    if (isFree("start") && near.every((x) => x > left + length + 26)) return { x: left + 10, y, anchor: "start" };
  }
  return null;
}
