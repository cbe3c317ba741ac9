/** Answers the page: what only a window can do is done here, everything else goes to the core as it is. */
import type { Transport } from "../../contract/client.ts";
import type { Reply } from "../../contract/reply.ts";
import { isShellRequestName, shellRequestInputs } from "../../contract/shellRequests.ts";
import { isOwnAddress } from "./pages.ts";
import { printFile } from "./print.ts";
import { saveFile } from "./saveFile.ts";

function refusal(code: string, what: string): Reply<never> {
  return { ok: false, error: { family: "request", code, what, where: null, whatToDo: null } };
}

/** Never throws: an exception that crosses to the page would lose its reason on the way. */
export async function answerFromPage(
  ask: Transport,
  pageAddress: string,
  name: string,
  input: unknown,
): Promise<Reply<unknown>> {
  if (!isOwnAddress(pageAddress)) return refusal("not-allowed", "The request comes from another page.");
  if (!isShellRequestName(name)) return ask(name, input);
  const checked = shellRequestInputs[name].safeParse(input);
  if (!checked.success) return refusal("bad-input", "The file to save or print could not be read.");
  try {
    return { ok: true, value: await (name === "saveFile" ? saveFile(checked.data) : printFile(checked.data)) };
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message : String(cause);
    return refusal("not-written", `The file could not be written: ${reason}.`);
  }
}
