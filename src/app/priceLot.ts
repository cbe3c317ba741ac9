/**
 * Several items priced by one fit, so that their errors are known together. An attribute that one of them is not known in is left
 * out for all: items priced by different fits share no covariance that could be stated.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import { AppError } from "../domain/errors.ts";
import { listWords, lowerStart } from "../domain/format.ts";
import { describeSubject, marketHeldAt } from "../valuation/describeSubject.ts";
import { estimatePrice } from "../valuation/estimatePrice.ts";
import { jointRange } from "../valuation/jointRange.ts";
import { fitInUse } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** Refuses items of different effective dates (different-days), and what `appraise` refuses. */
export function priceLot(
  ports: Ports,
  memory: EvidenceMemory,
  { classId, model, subjects, levels }: RequestInput<"priceLot">,
): RequestOutput<"priceLot"> {
  const assetClass = ports.store.assetClasses.get(classId);
  const first = subjects[0]!;
  if (subjects.some(({ effectiveOn }) => effectiveOn !== first.effectiveOn)) throw differentDays();
  const asked = { assetClass, model, subject: first, levels };
  const { sales, prepared } = memory.recall(assetClass, asked, () => ports.store.sales.readColumns(classId));
  const rows = subjects.map((subject) => describeSubject(prepared.design, assetClass, subject));
  const missing = [...new Set(rows.flatMap(({ notKnown }) => notKnown))];
  const leftOut = [...new Set([...model.leftOut, ...missing])];
  const { fit } = fitInUse({ ...asked, sales, model: { ...model, leftOut } }, prepared);
  const joint = jointRange(fit, rows, levels);
  const notKnown = prepared.design.groups
    .filter(({ key, product }) => product === null && missing.includes(key) && !model.leftOut.includes(key))
    .map(({ key, label }) => ({ key, label }));
  return {
    currencyCode: assetClass.currencyCode,
    items: subjects.map((subject, at) => {
      const held = marketHeldAt(prepared.design, subject);
      const { amount, rangeForOneSale } = estimatePrice(fit, rows[at]!, levels, held);
      return { subject, amount, rangeForOneSale };
    }),
    joint,
    jointRefused:
      joint === null ? "Sales of different weight, or effects drawn in, leave no exact range for several items." : null,
    notKnown,
    notKnownSentence:
      notKnown.length === 0
        ? null
        : `${listWords(notKnown.map(({ label }, at) => (at === 0 ? label : lowerStart(label))))} ${notKnown.length === 1 ? "is" : "are"} not known for every item, so the model without ${notKnown.length === 1 ? "it" : "them"} prices all of them.`,
  };
}

function differentDays(): AppError {
  return new AppError({
    family: "request",
    code: "different-days",
    what: "The items speak of different effective dates, and the evidence is bounded by one.",
    where: "effective date",
    whatToDo: "Give all of them the same date.",
  });
}
