/** Both published sets of sales with the stored doubles taken as exact, so that the floors speak of the engine, not of ln. */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { exactLeastSquares } from "../../src/app/digits/exactLeastSquares.ts";
import { logRelativeError } from "../../src/app/reachedDigits.ts";
import { solveLeastSquares } from "../../src/numerics/solveLeastSquares.ts";

function read(name: string): { x: Float64Array[]; y: Float64Array } {
  const text = (file: string) => readFileSync(new URL(`../reference/${name}/${file}`, import.meta.url), "utf8").trim();
  const [heading, ...lines] = text(`${name}.csv`).split(/\r?\n/);
  const keys = heading!.replaceAll('"', "").split(",");
  const rows = lines.map((line) => line.replaceAll('"', "").split(","));
  const cells = (key: string) => rows.map((row) => row[keys.indexOf(key)]!);
  const columns: string[] = JSON.parse(text("expected.json")).specification.columns.slice(1);
  const x = columns.map((column) => {
    const inner = /^log\((.*)\)$/.exec(column)?.[1];
    if (inner !== undefined) return Float64Array.from(cells(inner), (cell) => Math.log(Number(cell)));
    if (keys.includes(column)) return Float64Array.from(cells(column), Number);
    const key = keys.find((one) => column.startsWith(one) && cells(one).includes(column.slice(one.length)))!;
    return Float64Array.from(cells(key), (cell) => (cell === column.slice(key.length) ? 1 : 0));
  });
  return { x, y: Float64Array.from(cells("price"), (cell) => Math.log(Number(cell))) };
}

test.each([
  ["houseprices", 13],
  ["diamonds600", 12],
])("%s: coefficients, standard errors and scatter have %d right digits", (name, floor) => {
  const { x, y } = read(name);
  const exact = exactLeastSquares([new Float64Array(y.length).fill(1), ...x], y);
  const found = solveLeastSquares(x, y, { intercept: true });
  const least = (values: readonly number[], wanted: readonly string[]) =>
    Math.min(...values.map((value, at) => logRelativeError(value, Number(wanted[at]))));
  const b = least([found.intercept!, ...found.slopes], exact.estimates);
  const errors = least([found.interceptStandardError!, ...found.standardErrors], exact.standardDeviations);
  const scatter = logRelativeError(found.residualStandardError!, Number(exact.residualStandardDeviation));
  for (const digits of [b, errors, scatter]) expect(digits).toBeGreaterThanOrEqual(floor);
});
