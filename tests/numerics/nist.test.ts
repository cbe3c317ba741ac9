/** The eleven NIST StRD linear sets: digits reached in coefficients and their standard errors, with a floor for each set. */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";

interface NistSet {
  readonly intercept: boolean;
  readonly terms: readonly string[];
  readonly columns: readonly string[];
  readonly data: readonly (readonly string[])[];
  readonly highPrecision: {
    readonly estimates: readonly string[];
    readonly standardDeviations: readonly string[];
    readonly rSquared: string;
  };
}

const file = JSON.parse(readFileSync(new URL("../reference/nist/strd-linear.json", import.meta.url), "utf8"));
const sets: Record<string, NistSet> = file.datasets ?? file.sets ?? file;

/** Log relative error: −log₁₀|found − exact|/|exact|, absolute where the exact value is zero; 15 at most. */
function digits(found: number, exact: number): number {
  const error = exact === 0 ? Math.abs(found) : Math.abs(found - exact) / Math.abs(exact);
  return error === 0 ? 15 : Math.min(15, -Math.log10(error));
}

function columnsOf(set: NistSet): Float64Array[] {
  const x = set.columns.slice(1).map((_, at) => Float64Array.from(set.data, (row) => Number(row[at + 1])));
  const terms = set.intercept ? set.terms.slice(1) : set.terms;
  if (x.length === terms.length) return x;
  return terms.map((_, at) => x[0]!.map((value) => value ** (at + 1)));
}

/** Least digits asked of coefficients and of their standard errors. Filip: what its rounded inputs allow. */
const FLOORS: Record<string, readonly [number, number]> = {
  Norris: [13, 13],
  Pontius: [13, 13],
  NoInt1: [13, 13],
  NoInt2: [13, 13],
  Longley: [13, 13],
  Wampler1: [13, 13],
  Wampler2: [13, 13],
  Wampler3: [13, 13],
  Wampler4: [13, 13],
  Wampler5: [13, 13],
  Filip: [7, 7],
};

describe("NIST StRD, linear least squares (certified values)", () => {
  test.each(Object.entries(FLOORS))("%s reaches its digits", (name, [coefficientFloor, deviationFloor]) => {
    const set = sets[name]!;
    const response = Float64Array.from(set.data, (row) => Number(row[0]));
    const found = solveLeastSquares(columnsOf(set), response, { intercept: set.intercept });
    const estimates = [...(set.intercept ? [found.intercept!] : []), ...found.slopes];
    const deviations = [...(set.intercept ? [found.interceptStandardError!] : []), ...found.standardErrors];
    const estimateDigits = Math.min(...estimates.map((b, at) => digits(b, Number(set.highPrecision.estimates[at]))));
    const deviationDigits = Math.min(
      ...deviations.map((sd, at) => digits(sd, Number(set.highPrecision.standardDeviations[at]))),
    );
    expect(estimates).toHaveLength(set.highPrecision.estimates.length);
    expect(estimateDigits).toBeGreaterThanOrEqual(coefficientFloor);
    expect(deviationDigits).toBeGreaterThanOrEqual(deviationFloor);
    expect(found.digitsToTrust).toBeLessThanOrEqual(15);
    process.stdout.write(
      `${name.padEnd(10)} coefficients ${estimateDigits.toFixed(1)}  standard errors ${deviationDigits.toFixed(1)}  ${found.path}  trusts ${found.digitsToTrust}\n`,
    );
  });
});
