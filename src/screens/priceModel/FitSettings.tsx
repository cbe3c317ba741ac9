/** How the model is fitted: market movement, recent sales, estimator, what the errors suppose, which range is the price's own. */
import { useId } from "react";
import type { ErrorRule, Estimator, MarketForm, PriceModel, RangeKind } from "../../domain/priceModel.ts";
import { SegmentedChoice } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { setErrors, setEstimator, setHalfLife, setRange } from "./fitChanges.ts";
import css from "./settings.module.css";

const MARKET: readonly { value: MarketForm; label: string; title: string }[] = [
  { value: "line", label: "steady", title: "the same movement each month" },
  { value: "quarters", label: "by quarter", title: "each quarter its own level" },
  { value: "spline", label: "curve", title: "a smooth curve over the days of sale" },
  { value: "none", label: "none", title: "the day of sale does not matter" },
];

const ESTIMATORS: Readonly<Record<Estimator["kind"], string>> = {
  leastSquares: "least squares",
  huber: "Huber: far-off sales weigh less",
  mm: "MM: far-off sales weigh nothing",
  ridge: "ridge: steadies attributes that move together",
};

const RANGES: Readonly<Record<RangeKind, string>> = {
  exact: "exact, from an even and normal spread",
  "jackknife+": "jackknife+, asks for no shape of spread",
  "cv+": "CV+ in ten parts, asks for no shape",
  variance: "spread that changes with the price",
};

const ERROR_KINDS: readonly { value: ErrorRule["kind"]; label: string }[] = [
  { value: "even", label: "an even spread" },
  { value: "HC3", label: "any spread (HC3, cautious)" },
  { value: "HC2", label: "any spread (HC2)" },
  { value: "HC1", label: "any spread (HC1)" },
  { value: "HC0", label: "any spread (HC0, many sales)" },
];

export function FitSettings({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const { changeModel } = bench;
  return (
    <>
      <dt>Market movement</dt>
      <dd>
        <SegmentedChoice
          label="Market movement"
          value={model.market}
          options={MARKET}
          onChoose={(market) => changeModel((now) => ({ ...now, market }))}
        />
      </dd>
      <RecentSales bench={bench} months={model.halfLifeMonths ?? null} />
      <Pick
        label="Fitted by"
        value={model.estimator?.kind ?? "leastSquares"}
        options={Object.entries(ESTIMATORS).map(([value, label]) => ({ value, label }))}
        onPick={(kind) => changeModel((now) => setEstimator(now, kind as Estimator["kind"]))}
      />
      <ErrorsPick bench={bench} model={model} />
      <Pick
        label="Range"
        value={model.range ?? "exact"}
        options={Object.entries(RANGES).map(([value, label]) => ({ value, label }))}
        onPick={(kind) => changeModel((now) => setRange(now, kind as RangeKind))}
      />
    </>
  );
}

interface PickProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly { value: string; label: string }[];
  readonly onPick: (value: string) => void;
}

function Pick({ label, value, options, onPick }: PickProps) {
  const id = useId();
  return (
    <>
      <dt>
        <label htmlFor={id}>{label}</label>
      </dt>
      <dd>
        <select id={id} className={css.pick} value={value} onChange={(event) => onPick(event.target.value)}>
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.label}
            </option>
          ))}
        </select>
      </dd>
    </>
  );
}

/** Even, HC0–HC3, or sales of one source (or of one level of a choice) taken as alike. */
function ErrorsPick({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const choices = (bench.assetClass?.attributes ?? []).filter((one) => one.kind === "choice" && !one.archived);
  const clusters = [{ key: "source", label: "source" }, ...choices].map(({ key, label }) => ({
    value: `cluster ${key}`,
    label: `sales of one ${label.toLowerCase()} alike`,
  }));
  const { errors } = model;
  const value = errors === undefined ? "even" : errors.kind === "cluster" ? `cluster ${errors.by}` : errors.kind;
  const pick = (chosen: string): void => {
    const by = chosen.startsWith("cluster ") ? chosen.slice("cluster ".length) : null;
    const rule = by === null ? ({ kind: chosen } as ErrorRule) : { kind: "cluster" as const, by };
    bench.changeModel((now) => setErrors(now, rule));
  };
  return <Pick label="Errors suppose" value={value} options={[...ERROR_KINDS, ...clusters]} onPick={pick} />;
}

const HALF_LIVES: readonly number[] = [6, 12, 24, 36, 60];

function RecentSales({ bench, months }: { bench: Workbench; months: number | null }) {
  return (
    <Pick
      label="Older sales"
      value={String(months ?? "")}
      options={[
        { value: "", label: "count as much as recent ones" },
        ...HALF_LIVES.map((one) => ({ value: String(one), label: `count half every ${one} months` })),
      ]}
      onPick={(value) => bench.changeModel((now) => setHalfLife(now, value === "" ? null : Number(value)))}
    />
  );
}
