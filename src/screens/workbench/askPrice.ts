/**
 * The question behind the price strip: the whole appraisal, and where the last one took long a price at a glance first. A glance
 * that fails, has no answer or comes after the appraisal is passed over.
 */
import type { Client } from "../../contract/client.ts";
import type { RequestInput, RequestOutput } from "../../contract/requests.ts";
import type { GlancedPrice } from "../../domain/appraisal.ts";

/** Below this nobody sees a glance before the answer is there. */
const GLANCE_FROM_MS = 100;

/** `milliseconds`: of the last appraisal, null before the first. `show` is called at most once, before the promise settles. */
export async function askPrice(
  client: Client,
  input: RequestInput<"appraise">,
  milliseconds: number | null,
  show: (glanced: GlancedPrice) => void,
): Promise<RequestOutput<"appraise">> {
  let isAnswered = false;
  const { subject } = input;
  if (subject !== null && milliseconds !== null && milliseconds > GLANCE_FROM_MS) {
    const pass = (glanced: GlancedPrice | null): void => {
      if (glanced !== null && !isAnswered) show(glanced);
    };
    client.ask("glance", { ...input, subject }).then(pass, () => undefined);
  }
  try {
    return await client.ask("appraise", input);
  } finally {
    isAnswered = true;
  }
}
