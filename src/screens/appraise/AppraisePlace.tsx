/** Appraise: the subject on the left, its price and everything that explains it on the right. */
import type { Appraisal, PricePart, Range } from "../../domain/appraisal.ts";
import { formatDay, formatMoney, levelWords, roundingStep, roundOutward, roundTo } from "../../domain/format.ts";
import { priceBasisWords } from "../../domain/sale.ts";
import { BuiltUpSteps } from "../charts/BuiltUpSteps.tsx";
import { partStep, priceStep } from "../charts/figures.ts";
import { RangeGauge } from "../charts/RangeGauge.tsx";
import { hrefOf, useRoute } from "../frame/useRoute.ts";
import { Busy, ErrorNote, PaneLayout, SectionHeading, SegmentedChoice, SubPlaces } from "../parts/index.ts";
import { useWorkbench, type Workbench } from "../workbench/workbench.ts";
import css from "./AppraisePlace.module.css";
import { SetsOutcome } from "./everySet/SetsOutcome.tsx";
import { SetsPane } from "./everySet/SetsPane.tsx";
import { useEverySet } from "./everySet/useEverySet.ts";
import { LedgerTeaser } from "./LedgerTeaser.tsx";
import { NearRows } from "./NearRows.tsx";
import { NotKnowingView } from "./NotKnowingView.tsx";
import { NotPriced } from "./NotPriced.tsx";
import { PullRows } from "./PullRows.tsx";
import { RangeNote } from "./RangeNote.tsx";
import { SubjectPane } from "./SubjectPane.tsx";

const VIEWS: readonly { readonly sub: string | null; readonly href: string; readonly label: string }[] = [
  { sub: null, href: hrefOf("appraise"), label: "Subject" },
  { sub: "sets", href: hrefOf("appraise", "sets"), label: "Every attribute set" },
];

export function AppraisePlace() {
  const bench = useWorkbench();
  const { sub } = useRoute();
  const sets = useEverySet(sub === "sets" ? bench : null);
  if (bench.assetClass === null)
    return bench.error === null ? <Busy words="Opening" /> : <ErrorNote error={bench.error} />;
  const places = (
    <SubPlaces label="Appraise" places={VIEWS.map((view) => ({ ...view, isCurrent: view.sub === sub }))} />
  );
  if (sub === "sets") {
    return (
      <PaneLayout
        name="appraise-sets"
        leftWidth={420}
        leftLabel="Which sets count"
        rightLabel="What they say"
        left={
          <>
            {places}
            <SetsPane state={sets} />
          </>
        }
        right={<SetsOutcome bench={bench} state={sets} />}
      />
    );
  }
  return (
    <PaneLayout
      name="appraise"
      leftWidth={468}
      leftLabel="Subject"
      rightLabel="Price"
      left={
        <>
          {places}
          <SubjectPane bench={bench} />
        </>
      }
      right={<Outcome bench={bench} />}
    />
  );
}

function Outcome({ bench }: { readonly bench: Workbench }) {
  const { appraisal } = bench;
  if (bench.status === "notPriced" || appraisal === null || appraisal.priced === null) {
    return <NotPriced error={bench.error} />;
  }
  return <Priced bench={bench} appraisal={appraisal} priced={appraisal.priced} />;
}

function at(ranges: readonly Range[], level: number): Range | null {
  return ranges.find((range) => range.level === level) ?? null;
}

interface PricedProps {
  readonly bench: Workbench;
  readonly appraisal: Appraisal;
  readonly priced: PricePart;
}

function Priced({ bench, appraisal, priced }: PricedProps) {
  const { currencyCode } = appraisal.assetClass;
  return (
    <>
      <Headline bench={bench} appraisal={appraisal} priced={priced} />
      <div className={css.gauge}>
        <RangeGauge
          price={priced.price}
          currencyCode={currencyCode}
          level={bench.level}
          basisWords={basisWordsOf(bench)}
        />
      </div>
      <RangeNote price={priced.price} level={bench.level} step={priceStep(priced.price)} currencyCode={currencyCode} />
      <div className={css.two}>
        <section aria-labelledby="built-up">
          <SectionHeading id="built-up" aside={`money along the path, top to bottom; ${currencyCode}`}>
            Built up from the average sale
          </SectionHeading>
          <BuiltUpSteps
            builtUp={priced.builtUp}
            saleCount={appraisal.report.n}
            subject={priced.subject.title}
            currencyCode={currencyCode}
            step={partStep(priced.price)}
            priceStep={priceStep(priced.price)}
          />
        </section>
        <div className={css.side}>
          <LedgerTeaser appraisal={appraisal} />
          {priced.notKnowing === undefined || priced.notKnowing === null ? null : (
            <NotKnowingView
              found={priced.notKnowing}
              amount={priced.price.amount}
              step={priceStep(priced.price)}
              currencyCode={currencyCode}
            />
          )}
          <PullRows priced={priced} report={appraisal.report} currencyCode={currencyCode} />
          <NearRows priced={priced} report={appraisal.report} currencyCode={currencyCode} />
          <Caveats appraisal={appraisal} />
        </div>
      </div>
    </>
  );
}

function Headline({ bench, appraisal, priced }: PricedProps) {
  const { itemWord, currencyCode } = appraisal.assetClass;
  const { price } = priced;
  const range = at(price.rangeForOneSale, bench.level);
  const step = roundingStep(at(price.rangeForOneSale, 0.9) ?? { low: price.amount, high: price.amount });
  const ends = range === null ? null : roundOutward(range, step);
  const money = (value: number) => formatMoney(value, currencyCode);
  return (
    <div className={css.top}>
      <div>
        <p className={css.sentence}>
          At {formatDay(priced.subject.effectiveOn)} this {itemWord} is priced at{" "}
          <strong>{money(roundTo(price.amount, step))}.</strong>
          {ends === null ? null : (
            <>
              {" "}
              {capital(levelWords(bench.level))} sales of such {article(itemWord)} would fall between{" "}
              <strong>{money(ends.low)}</strong> and <strong>{money(ends.high)}.</strong>
            </>
          )}
        </p>
        <p className={css.second}>{priced.notKnown.map((one) => one.sentence).join(" ")}</p>
        {price.marketHeldAt === null ? null : (
          <p className={`${css.second} soft`}>
            Market movement is held at {formatDay(price.marketHeldAt)}, the last sale of the evidence.
          </p>
        )}
      </div>
      <div className={css.acts}>
        <a className={css.draft} href="#/sheets/draft">
          Draft sheet
        </a>
        <SegmentedChoice
          label="How sure the range is"
          options={bench.levels.map((level) => ({
            value: level,
            label: level === bench.level ? `${Math.round(level * 100)} %` : String(Math.round(level * 100)),
            title: levelWords(level),
          }))}
          value={bench.level}
          onChoose={bench.setLevel}
        />
      </div>
    </div>
  );
}

function Caveats({ appraisal }: { readonly appraisal: Appraisal }) {
  if (appraisal.caveats.length === 0) return null;
  return (
    <section aria-labelledby="caveats">
      <SectionHeading id="caveats" aside="largest first; the first three print on page 1">
        Caveats the program found
      </SectionHeading>
      <ol className={css.caveats}>
        {appraisal.caveats.map((caveat) => (
          <li key={caveat.code}>
            <b>{caveat.headline}</b> {caveat.text}
            {caveat.wouldRead.length === 0 ? null : <span className="soft"> {caveat.wouldRead.join("; ")}.</span>}
          </li>
        ))}
      </ol>
    </section>
  );
}

/** "EUR, premium in, tax out" */
function basisWordsOf({ assetClass }: Workbench): string {
  return assetClass === null ? "" : `${assetClass.currencyCode}, ${priceBasisWords(assetClass.priceBasis)}`;
}

/** "9 in 10" → "Nine in ten" */
function capital(words: string): string {
  const names: Readonly<Record<string, string>> = {
    "9 in 10": "Nine in ten",
    "8 in 10": "Eight in ten",
    "1 in 2": "One in two",
  };
  return names[words] ?? words;
}

function article(word: string): string {
  return `${/^[aeiou]/i.test(word) ? "an" : "a"} ${word}`;
}
