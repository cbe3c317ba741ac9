// A process that loads a file of doubles, fits it once and prints its peak memory. Usage: peak.js FILE ROWS NUMERIC LEVELS
import { closeSync, openSync, readFileSync, readSync } from "node:fs";
import { columnsOf } from "./drawData.ts";
import { fitFast } from "./fitFast.ts";

const [file = "", rowText = "", numericText = "", levelText = ""] = process.argv.slice(2);
const rows = Number(rowText);
const levels = levelText.split(",").map(Number);
const input = openSync(file, "r");

function readDoubles(into: Float64Array): Float64Array {
  const bytes = new Uint8Array(into.buffer);
  for (let at = 0; at < bytes.length; ) {
    const count = readSync(input, bytes, at, bytes.length - at, null);
    if (count === 0) throw new Error("the file is shorter than it should be");
    at += count;
  }
  return into;
}

const response = readDoubles(new Float64Array(rows));
const numbers = Array.from({ length: Number(numericText) }, () => readDoubles(new Float64Array(rows)));
const one = new Float64Array(rows);
const codes = levels.map(() => Uint16Array.from(readDoubles(one)));
closeSync(input);
const { standardErrors } = fitFast({ columns: columnsOf(numbers, codes, levels), response });
if (standardErrors.some((value) => !(value > 0))) throw new Error("the fit has standard errors that are not above 0");
const line = readFileSync("/proc/self/status", "utf8")
  .split("\n")
  .find((text) => text.startsWith("VmHWM"));
process.stdout.write(JSON.stringify({ megabytes: Number(/\d+/.exec(line ?? "")![0]) / 1024 }));
