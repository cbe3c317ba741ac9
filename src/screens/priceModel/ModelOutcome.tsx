/** What comes of the model: one sentence, what it does to error and price, and the carry-over ledger. */
import { useState } from "react";
import type { Appraisal, ModelReport } from "../../domain/appraisal.ts";
import { type PlainError, sentenceOf } from "../../domain/errors.ts";
import { formatMoney, formatNumber, formatPercent, lowerStart, roundTo } from "../../domain/format.ts";
import { priceStep } from "../charts/figures.ts";
import { hrefOf } from "../frame/useRoute.ts";
import { Busy, Button, ErrorNote, Sentence, StrongMoney, TextLink } from "../parts/index.ts";
import { plainErrorOf } from "../workbench/useAppraisal.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { CarryOverLedger } from "./CarryOverLedger.tsx";
import css from "./PriceModelPlace.module.css";

export function ModelOutcome({ bench }: { bench: Workbench }) {
  const { appraisal, error } = bench;
  if (appraisal === null) {
    if (error === null) return <Busy words="Fitting" />;
    return <NotFitted bench={bench} error={error} />;
  }
  return (
    <>
      <div className={css.top}>
        <Sentence>
          <StrongMoney text={appraisal.ledger.headline} />
        </Sentence>
        <SaveEdition bench={bench} />
      </div>
      <SecondLine bench={bench} appraisal={appraisal} />
      <CarryOverLedger
        bench={bench}
        ledger={appraisal.ledger}
        report={appraisal.report}
        currencyCode={appraisal.assetClass.currencyCode}
      />
    </>
  );
}

/** No fit: the reason drawn where the outcome would be, with the way back beside it. */
function NotFitted({ bench, error }: { bench: Workbench; error: PlainError }) {
  return (
    <>
      <Sentence narrow>This model cannot be fitted, so there is no price.</Sentence>
      <div style={{ marginTop: 12 }}>
        <ErrorNote error={error}>
          <p style={{ marginTop: 8, display: "flex", gap: 16 }}>
            {bench.canUndo ? <TextLink onPress={bench.undo}>Undo the last change</TextLink> : null}
            <TextLink href={hrefOf("sales")}>Look at the sales</TextLink>
          </p>
        </ErrorNote>
      </div>
    </>
  );
}

function SecondLine({ bench, appraisal }: { bench: Workbench; appraisal: Appraisal }) {
  const { report, priced, assetClass } = appraisal;
  const { move, leftOutJustNow, changeModel } = bench;
  const label = bench.assetClass?.attributes.find((one) => one.key === leftOutJustNow)?.label ?? null;
  const step = priced === null ? 1 : priceStep(priced.price);
  const money = (amount: number): string => formatMoney(roundTo(amount, step), assetClass.currencyCode);
  return (
    <p className={css.say}>
      {errorWords(report, move?.fromTypicalError ?? null)}
      {move !== null ? `The price moves from ${money(move.from)} to ${money(move.to)}. ` : ""}
      {move === null && priced !== null ? `${priced.subject.title} reads ${money(priced.price.amount)}. ` : ""}
      {label === null || leftOutJustNow === null ? null : (
        <TextLink
          onPress={() =>
            changeModel((now) => ({ ...now, leftOut: now.leftOut.filter((key) => key !== leftOutJustNow) }))
          }
        >
          Put {lowerStart(label)} back
        </TextLink>
      )}
    </p>
  );
}

/** "Typical error on a sale not yet seen rises from 11.0 % to 18.3 %." where it has just moved. */
export function errorWords(
  { looTypicalError: now, n }: Pick<ModelReport, "looTypicalError" | "n">,
  before: number | null,
) {
  if (now === null) return `Fitted on ${formatNumber(n)} sales. `;
  const [from, to] = [before === null ? null : formatPercent(before, 1), formatPercent(now, 1)];
  if (before === null || from === to) return `Typical error on a sale not yet seen: ${to}. `;
  return `Typical error on a sale not yet seen ${now > before ? "rises" : "falls"} from ${from} to ${to}. `;
}

/** Saves model and evidence as the next edition; what it cannot do is said beside the button. */
function SaveEdition({ bench }: { bench: Workbench }) {
  const [refusal, setRefusal] = useState<PlainError | null>(null);
  const [isSaving, setSaving] = useState(false);
  const { status, edition } = bench;
  const save = async (): Promise<void> => {
    setSaving(true);
    try {
      await bench.saveEdition();
      setRefusal(null);
    } catch (cause) {
      setRefusal(plainErrorOf(cause));
    } finally {
      setSaving(false);
    }
  };
  const isSaved = status === "saved";
  return (
    <div style={{ textAlign: "right" }}>
      <Button primary disabled={isSaved || isSaving} onClick={() => void save()}>
        {isSaved ? `Edition ${edition?.number ?? ""} saved` : `Save edition ${(edition?.number ?? 0) + 1}`}
      </Button>
      {refusal === null ? null : (
        <p role="alert" className="fine brick" style={{ maxWidth: 220, marginTop: 4 }}>
          {sentenceOf(refusal)}
        </p>
      )}
    </div>
  );
}
