/**
 * A blend: one column from several numbers that measure the same thing, in place of them. z_j = (x_j − m_j)/s_j over the
 * evidence, each sale counting alike; blend = Σ sign_j·w_j·z_j/Σ|w_j| with w = 1, the loadings of the first principal component
 * (Hotelling 1933), or the valuer's own. Its coefficient reads per standard deviation of the members.
 */
import { AppError } from "../domain/errors.ts";
import type { Blend } from "../domain/priceModel.ts";
import { firstComponent, type StandardColumn, standardOf } from "../numerics/firstComponent.ts";

export interface BlendMember {
  readonly key: string;
  readonly label: string;
  /** n raw values; age in years for built. */
  readonly stored: Float64Array;
}

export interface BlendColumn {
  readonly values: Float64Array;
  readonly at: (values: ReadonlyMap<string, number>) => number;
}

/** Refuses what cannot be put together: members that are no numbers, not in the set, or in two blends at once. */
export function checkBlends(
  blends: readonly Blend[],
  numbers: ReadonlySet<string>,
  labelOf: (key: string) => string,
): void {
  const taken = new Map<string, string>();
  for (const blend of blends) {
    for (const { key } of blend.members) {
      if (!numbers.has(key))
        throw refusal(blend, `${labelOf(key)} is not a number of the attribute set, so it cannot be blended.`);
      const other = taken.get(key);
      if (other !== undefined) throw refusal(blend, `${labelOf(key)} is in the blend ${other} already.`);
      taken.set(key, blend.label);
    }
  }
}

/** Refuses (AppError, family "fit"): fewer than two members, a member that does not vary, own weights that are all zero. */
export function blendColumn(blend: Blend, members: readonly BlendMember[]): BlendColumn {
  if (members.length < 2) throw refusal(blend, "A blend needs at least two attributes that are numbers.");
  const standards = members.map(({ stored }) => standardOf(stored));
  const flat = members.find((_, j) => !(standards[j]!.spread > 0));
  if (flat !== undefined)
    throw refusal(blend, `${flat.label} has the same value in every sale, so it cannot be blended.`);
  const weights = weightsOf(blend, members, standards);
  const whole = weights.reduce((sum, one) => sum + Math.abs(one), 0);
  if (!(whole > 0)) throw refusal(blend, "The weights of the blend are all zero.");
  const at = (values: ReadonlyMap<string, number>): number =>
    members.reduce((sum, { key }, j) => {
      const { mean, spread } = standards[j]!;
      return sum + (weights[j]! / whole) * ((values.get(key)! - mean) / spread);
    }, 0);
  const n = members[0]!.stored.length;
  const values = new Float64Array(n);
  for (let i = 0; i < n; i++) values[i] = at(new Map(members.map(({ key, stored }) => [key, stored[i]!])));
  return { values, at };
}

/** Signed weights in the order of the members. */
function weightsOf(blend: Blend, members: readonly BlendMember[], standards: readonly StandardColumn[]): number[] {
  const signOf = (key: string) => blend.members.find((one) => one.key === key)!.sign;
  if (blend.weighting === "own") {
    return members.map(({ key }) => signOf(key) * Math.abs(blend.members.find((one) => one.key === key)!.weight));
  }
  if (blend.weighting === "equal") return members.map(({ key }) => signOf(key));
  const turned = members.map(({ key, stored }, j) => stored.map((x) => signOf(key) * (x - standards[j]!.mean)));
  return firstComponent(turned).map((loading, j) => loading * signOf(members[j]!.key));
}

function refusal(blend: Blend, what: string): AppError {
  return new AppError({
    family: "fit",
    code: "blend",
    what,
    where: `Price model, blend ${blend.label}`,
    whatToDo: "Choose other members or weights, or take the blend apart.",
  });
}
