/** Saves a numbered, immutable edition of a price model on the evidence as it stands, with its journal entry. */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { Appraisal } from "../domain/appraisal.ts";
import type { AssetClass } from "../domain/assetClass.ts";
import { canonicalEvidence } from "../domain/evidenceTable.ts";
import type { Edition, EditionSummary, PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import { toEvidenceTable } from "../evidence/evidenceTable.ts";
import { type ComputedAppraisal, computeAppraisal } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import { counted, personOf, recordAct } from "./recordAct.ts";

export function saveEdition(
  ports: Ports,
  { classId, model }: RequestInput<"saveEdition">,
): RequestOutput<"saveEdition"> {
  const assetClass = ports.store.assetClasses.get(classId);
  const sales = ports.store.sales.readColumns(classId);
  const computed = computeAppraisal({ assetClass, sales, model, subject: null, levels: [0.9] });
  return ports.store.transaction(() => insertEdition(ports, assetClass, model, sales, computed));
}

/** Inside a transaction: the edition on exactly this evidence, new or the latest one when nothing has changed since. */
export function insertEdition(
  ports: Ports,
  assetClass: AssetClass,
  model: PriceModel,
  sales: SaleColumns,
  computed: ComputedAppraisal,
): Edition {
  const table = toEvidenceTable(sales, computed.used, assetClass, model);
  const evidenceFingerprint = ports.sha256(canonicalEvidence(table));
  const latest = ports.store.editions.latest(assetClass.id);
  if (
    latest !== null &&
    latest.evidenceFingerprint === evidenceFingerprint &&
    JSON.stringify(latest.model) === JSON.stringify(model)
  ) {
    return latest;
  }
  const edition = ports.store.editions.insert({
    assetClassId: assetClass.id,
    savedAtUtc: ports.nowUtc(),
    savedBy: personOf(ports),
    model,
    evidenceFingerprint,
    saleIds: table.rows.map((row) => row.id),
    summary: summaryOf(computed.appraisal),
    report: computed.appraisal.report,
  });
  recordAct(ports, {
    act: "edition-saved",
    assetClassId: assetClass.id,
    sentence: `Edition ${edition.number} of ${assetClass.name} saved on ${counted(edition.saleCount, "sale")}.`,
    facts: { edition: edition.number, fingerprint: evidenceFingerprint, sales: edition.saleCount, model },
  });
  return edition;
}

function summaryOf({ report }: Appraisal): EditionSummary {
  return {
    n: report.n,
    p: report.p,
    s: report.s,
    r2: report.r2,
    looR2: report.looR2,
    coefficients: report.coefficients.map(({ attribute, level, estimate }) => ({ attribute, level, estimate })),
  };
}
