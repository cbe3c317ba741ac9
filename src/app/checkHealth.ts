/** The health of a price model: checks of its fit, the power the sales speak for, price against ln price, the market's path. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { AppError } from "../domain/errors.ts";
import { listWords, lowerStart } from "../domain/format.ts";
import type { HealthCheck, ModelHealth } from "../domain/modelHealth.ts";
import type { SaleColumns } from "../domain/sale.ts";
import { compareResponses } from "../hedonic/compareResponses.ts";
import { diagnoseFit } from "../hedonic/diagnoseFit.ts";
import type { Fit } from "../hedonic/fit.ts";
import { marketIndex } from "../hedonic/marketIndex.ts";
import { advisePower } from "../hedonic/powerProfile.ts";
import { computeAppraisal } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** With more sales than this the power and the two responses take too long to wait for. */
const MANY_SALES = 200_000;

export function checkHealth(
  ports: Ports,
  memory: EvidenceMemory,
  { classId, model, subject }: RequestInput<"health">,
): RequestOutput<"health"> {
  const assetClass = ports.store.assetClasses.get(classId);
  const question = { assetClass, model, subject, levels: [0.9] };
  const { sales, prepared } = memory.recall(assetClass, question, () => ports.store.sales.readColumns(classId));
  const { fit, errors } = computeAppraisal({ ...question, sales }, prepared);
  const { found, leftOut } = diagnoseFit(fit);
  const checks = found.map((one) => named(one, sales));
  return {
    currencyCode: assetClass.currencyCode,
    saleCount: fit.design.n,
    checks,
    leftOut,
    ...responsesOf(fit),
    index: marketIndex(fit, errors),
    headline: headlineOf(checks),
  };
}

function named(
  { sales: places = [], ...check }: ReturnType<typeof diagnoseFit>["found"][number],
  sales: SaleColumns,
): HealthCheck {
  const listed = places.map((at) => ({
    sale: sales.ids[at]!,
    reference: sales.references.at(at) ?? null,
    title: sales.titles.at(at)!,
  }));
  return { ...check, sales: listed };
}

/** A price of zero has no logarithm, and a fit may be refused without one attribute: then there is nothing to compare. */
function responsesOf({ design, groups }: Fit): Pick<ModelHealth, "power" | "responses"> {
  const isPositive = design.prices.every((price) => price > 0);
  if (!isPositive || design.n > MANY_SALES) return { power: null, responses: null };
  try {
    const { price, lnPrice, better, sentence } = compareResponses(design, groups);
    return { power: advisePower(design, groups), responses: { price, lnPrice, better, sentence } };
  } catch (cause) {
    if (cause instanceof AppError) return { power: null, responses: null };
    throw cause;
  }
}

function headlineOf(checks: readonly HealthCheck[]): string {
  const names = (verdict: HealthCheck["verdict"]) =>
    checks.filter((one) => one.verdict === verdict).map(({ label }) => lowerStart(label));
  const [trouble, look] = [names("trouble"), names("look")];
  if (checks.length === 0) return "Nothing could be checked: see the reasons below.";
  if (trouble.length === 0 && look.length === 0) return `All ${checks.length} checks find nothing against this model.`;
  if (trouble.length === 0) return `Nothing serious; look at ${listWords(look)}.`;
  return `The checks speak against this model in ${listWords(trouble)}${look.length === 0 ? "." : `; look at ${listWords(look)} too.`}`;
}
