/** The help, made from the verbs themselves. */
import type { Verb } from "./verb.ts";

const widest = (words: readonly string[]): number => Math.max(0, ...words.map((word) => word.length));

export function generalHelp(verbs: readonly Verb[]): string {
  const width = widest(verbs.map(({ name }) => name));
  return [
    "Lotwright prices used items from comparable sales, with an honest range and an explanation.",
    "",
    "npm run -s lotwright -- <verb> …",
    "",
    ...verbs.map(({ name, does }) => `  ${name.padEnd(width)}   ${does}`),
    `  ${"help".padEnd(width)}   says this, or with a verb's name what that verb takes`,
    "",
    "Add --json for machines. Ends with 0 when done, 1 when refused, 2 when the program failed.",
  ].join("\n");
}

export function verbHelp(verb: Verb): string {
  const width = widest(verb.meanings.map(([option]) => option));
  return [
    `${verb.name} ${verb.does}.`,
    "",
    ...verb.usage.map((line) => `  ${line}`),
    "",
    ...verb.meanings.map(([option, meaning]) => `  ${option.padEnd(width)}   ${meaning}`),
  ].join("\n");
}
