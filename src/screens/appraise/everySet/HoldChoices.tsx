/** Which attributes are held in every set, which out of every set, and which are free; said in words above the choices. */
import type { EverySet } from "../../../domain/attributeSets.ts";
import { formatNumber, listWords, lowerStart } from "../../../domain/format.ts";
import { SegmentedChoice } from "../../parts/index.ts";
import css from "./everySet.module.css";
import type { EverySetState, Hold } from "./useEverySet.ts";

const HOLDS: readonly { value: Hold; label: string; title: string }[] = [
  { value: "in", label: "in", title: "In every set" },
  { value: "free", label: "free", title: "In or out, in every combination" },
  { value: "out", label: "out", title: "Out of every set" },
];

export function HoldChoices({ state, found }: { readonly state: EverySetState; readonly found: EverySet }) {
  const { heldIn = [], heldOut = [], pinned, attributes } = found;
  const rows = [...heldIn, ...pinned, ...attributes, ...heldOut].sort((a, b) => a.label.localeCompare(b.label, "en"));
  return (
    <details className="small">
      <summary>Hold attributes in or out: {holdWords(found)}</summary>
      <ul className={css.holds}>
        {rows.map(({ key, label }) => (
          <li key={key}>
            <span>{label}</span>
            <SegmentedChoice
              label={`${label}: in every set, free, or out of every set`}
              options={HOLDS}
              value={holdOf(state, key)}
              onChoose={(hold) => state.hold(key, hold)}
            />
          </li>
        ))}
      </ul>
    </details>
  );
}

function holdOf({ holds }: EverySetState, key: string): Hold {
  return holds.get(key) ?? "free";
}

/** "hours in, age out; 256 sets of the other 8". */
export function holdWords({ heldIn = [], heldOut = [], attributes }: EverySet): string {
  if (heldIn.length + heldOut.length === 0) return "none is held";
  const names = (some: EverySet["attributes"]): string => listWords(some.map(({ label }) => lowerStart(label)));
  const parts = [
    ...(heldIn.length === 0 ? [] : [`${names(heldIn)} in`]),
    ...(heldOut.length === 0 ? [] : [`${names(heldOut)} out`]),
  ];
  const count = attributes.length;
  return `${parts.join(", ")}; ${formatNumber(2 ** count)} sets of the other ${formatNumber(count)}`;
}
