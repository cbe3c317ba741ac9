/** One command from its words to its exit code: 0 done, 1 refused, 2 failure. Errors are sentences on stderr. */
import { parseArgs } from "node:util";
import { AppError, type PlainError, sentenceOf } from "../../domain/errors.ts";
import { CoreFailure } from "../asking.ts";
import { logToFile } from "../openWorkshop.ts";
import { generalHelp, verbHelp } from "./help.ts";
import { refuse, type Verb, type VerbInput } from "./verb.ts";
import { VERBS } from "./verbs/index.ts";

export interface Console {
  out(text: string): void;
  err(text: string): void;
}

const PROCESS: Console = {
  out: (text) => void process.stdout.write(`${text}\n`),
  err: (text) => void process.stderr.write(`${text}\n`),
};

const FAILED: PlainError = {
  family: "bug",
  code: "unexpected",
  what: "Something went wrong inside the program.",
  where: null,
  whatToDo: "Try again; if it happens again, the log in Lotwright's data folder holds the cause.",
};

function verbNamed(name: string): Verb {
  const verb = VERBS.find((one) => one.name === name);
  if (verb !== undefined) return verb;
  const names = VERBS.map((one) => one.name).join(", ");
  throw refuse("no-such-verb", `There is no verb "${name}".`, null, `Use one of: ${names}, help.`);
}

function inputOf(verb: Verb, words: readonly string[]): VerbInput {
  let parsed: { values: Record<string, unknown>; positionals: string[] };
  try {
    const options = { ...verb.options, json: { type: "boolean" } } as const;
    parsed = parseArgs({ args: [...words], options, allowPositionals: true });
  } catch (cause) {
    if (!(cause instanceof TypeError)) throw cause;
    throw refuse("bad-option", `${cause.message.split(". ")[0]}.`, verb.name, `See: help ${verb.name}.`);
  }
  if (parsed.positionals.length !== verb.places) {
    const wanted = verb.places === 0 ? "takes no file name" : `takes ${verb.places} file name`;
    throw refuse(
      "bad-places",
      `The verb ${verb.name} ${wanted}; ${parsed.positionals.length} were given.`,
      null,
      `See: help ${verb.name}.`,
    );
  }
  const given = parsed.values as VerbInput["given"];
  return { places: parsed.positionals, given, wantsJson: given.json === true };
}

function helpFor(words: readonly string[]): string | null {
  const [first = "help", second] = words.filter((word) => word !== "--json");
  if (words.includes("--help") && first !== "--help") return verbHelp(verbNamed(first));
  if (!["help", "--help", "-h"].includes(first)) return null;
  return second === undefined ? generalHelp(VERBS) : verbHelp(verbNamed(second));
}

function report(cause: unknown, wantsJson: boolean, io: Console): number {
  const isRefusal = cause instanceof AppError;
  const plain = isRefusal ? cause.toPlain() : cause instanceof CoreFailure ? cause.plain : FAILED;
  if (!isRefusal && !(cause instanceof CoreFailure)) logToFile(cause);
  io.err(sentenceOf(plain));
  if (wantsJson) io.out(JSON.stringify({ ok: false, error: plain }, null, 2));
  return isRefusal ? 1 : 2;
}

export async function runCommand(words: readonly string[], io: Console = PROCESS): Promise<number> {
  const wantsJson = words.includes("--json");
  try {
    const help = helpFor(words);
    if (help !== null) {
      io.out(wantsJson ? JSON.stringify({ ok: true, help }, null, 2) : help);
      return 0;
    }
    const verb = verbNamed(words[0]!);
    const input = inputOf(verb, words.slice(1));
    const output = await verb.run(input);
    const answer = input.wantsJson ? (JSON.stringify(output.json, null, 2) ?? "") : output.text;
    if (answer !== "") io.out(answer);
    return output.refused === true ? 1 : 0;
  } catch (cause) {
    return report(cause, wantsJson, io);
  }
}
