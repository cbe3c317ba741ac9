/** What every verb is: its words, its options, and what it gives back; how that is printed is not its business. */
import type { ParseArgsConfig } from "node:util";
import { AppError } from "../../domain/errors.ts";

export type Options = NonNullable<ParseArgsConfig["options"]>;
export type Given = Readonly<Record<string, string | boolean | undefined>>;

export interface VerbInput {
  /** Names of files and the like, in the order given. */
  readonly places: readonly string[];
  readonly given: Given;
  /** True where the answer will be printed as JSON: nothing else may go to stdout then. */
  readonly wantsJson: boolean;
}

export interface VerbOutput {
  readonly text: string;
  readonly json: unknown;
  /** True when the work was done but its answer is "no": an altered sheet. Exit code 1. */
  readonly refused?: boolean;
}

export interface Verb {
  readonly name: string;
  /** One line for the list of verbs. */
  readonly does: string;
  /** "SALES.csv --price COL …", one line each. */
  readonly usage: readonly string[];
  /** What each option means, in the order of help. */
  readonly meanings: readonly (readonly [option: string, meaning: string])[];
  readonly options: Options;
  /** How many places it wants. */
  readonly places: number;
  run(input: VerbInput): Promise<VerbOutput>;
}

export function refuse(code: string, what: string, where: string | null, whatToDo: string | null): AppError {
  return new AppError({ family: "request", code, what, where, whatToDo });
}

/** The option's text; refuses with a sentence when it was not given. */
export function required(given: Given, option: string): string {
  const value = given[option];
  if (typeof value === "string" && value !== "") return value;
  throw refuse("option-missing", `This needs --${option}.`, null, "See the verb's help: help <verb>.");
}

export function optional(given: Given, option: string): string | null {
  const value = given[option];
  return typeof value === "string" && value !== "" ? value : null;
}

/** "a, b,c" → ["a", "b", "c"]; not given → []. */
export function listOf(given: Given, option: string): string[] {
  const text = optional(given, option) ?? "";
  return text
    .split(",")
    .map((part) => part.trim())
    .filter((part) => part !== "");
}

export const USUAL_LEVELS: readonly number[] = [0.5, 0.8, 0.9, 0.95];

/** "50,90" in percent → fractions in rising order; refuses what is not between 0 and 100. */
export function levelsOf(given: Given): number[] {
  const texts = listOf(given, "levels");
  if (texts.length === 0) return [...USUAL_LEVELS];
  const levels = texts.map((text) => Number(text) / 100).sort((a, b) => a - b);
  if (levels.length <= 6 && levels.every((level) => level > 0 && level < 1)) return levels;
  throw refuse(
    "bad-levels",
    "The levels could not be read.",
    "--levels",
    "Give up to six percentages, such as 50,80,90,95.",
  );
}
