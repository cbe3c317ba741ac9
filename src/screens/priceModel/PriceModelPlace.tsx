/** Price model: the attribute set on its rail, what it rests on at the left, what comes of it at the right. */
import { useMemo } from "react";
import { hrefOf, useRoute } from "../frame/useRoute.ts";
import { Busy, EmptyState, ErrorNote, PaneLayout, SubPlaces, TextLink } from "../parts/index.ts";
import { useActs } from "../workbench/acts.ts";
import { useWorkbench, type Workbench } from "../workbench/workbench.ts";
import { AttributeRail } from "./AttributeRail.tsx";
import { CompareChoice, CompareOutcome, type CompareState, useCompare } from "./CompareModels.tsx";
import { HealthOutcome } from "./ModelHealth.tsx";
import { ModelOutcome } from "./ModelOutcome.tsx";
import { ModelPane } from "./ModelPane.tsx";
import { switchAttribute } from "./modelChanges.ts";
import css from "./PriceModelPlace.module.css";
import { tilesOf } from "./tiles.ts";

const VIEWS: readonly { readonly sub: string | null; readonly href: string; readonly label: string }[] = [
  { sub: null, href: hrefOf("price-model"), label: "Fit and ledger" },
  { sub: "health", href: hrefOf("price-model", "health"), label: "Health" },
  { sub: "compare", href: hrefOf("price-model", "compare"), label: "Compare" },
];

export function PriceModelPlace() {
  const bench = useWorkbench();
  const { sub } = useRoute();
  const compare = useCompare(bench);
  const { assetClass, model, appraisal, leftOutJustNow, changeModel, error } = bench;
  const tiles = useMemo(
    () =>
      assetClass === null || model === null
        ? []
        : tilesOf(assetClass, model, appraisal?.report ?? null, leftOutJustNow),
    [assetClass, model, appraisal, leftOutJustNow],
  );
  const acts = useMemo(
    () =>
      tiles.map(({ attribute, state }) => ({
        label: `${state === "in" ? "Leave out" : "Put in"}: ${attribute.label}`,
        run: () => changeModel((now) => switchAttribute(now, attribute.key, attribute.kind)),
      })),
    [tiles, changeModel],
  );
  useActs(acts);
  if (assetClass === null || model === null) {
    return error === null ? <Busy words="Opening the class" /> : <ErrorNote error={error} />;
  }
  if (bench.summary?.saleCount === 0) {
    return (
      <PaneLayout
        name="price-model"
        left={<EmptyState sentence={`There are no sales of ${assetClass.name} yet, so there is nothing to fit.`} />}
        right={<TextLink href={hrefOf("sales")}>Bring in a file of sales</TextLink>}
      />
    );
  }
  return (
    <div className={css.place}>
      <AttributeRail tiles={tiles} bench={bench} />
      <PaneLayout
        name="price-model"
        leftWidth={480}
        leftLabel="What the model rests on"
        rightLabel="What comes of it"
        left={
          <>
            <SubPlaces label="Price model" places={VIEWS.map((view) => ({ ...view, isCurrent: view.sub === sub }))} />
            {sub === "compare" ? <CompareChoice state={compare} /> : <ModelPane bench={bench} model={model} />}
          </>
        }
        right={<Outcome sub={sub} bench={bench} compare={compare} />}
      />
    </div>
  );
}

interface OutcomeProps {
  readonly sub: string | null;
  readonly bench: Workbench;
  readonly compare: CompareState;
}

function Outcome({ sub, bench, compare }: OutcomeProps) {
  if (sub === "compare") return <CompareOutcome bench={bench} state={compare} />;
  return sub === "health" ? <HealthOutcome bench={bench} /> : <ModelOutcome bench={bench} />;
}
