/** One attribute read: how it lies in the evidence, what moves together with it, and what can be done with it. */
import type { Appraisal, AttributeEvidence } from "../../domain/appraisal.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import { Button, Notice, SectionHeading, Sentence } from "../parts/index.ts";
import css from "./AttributesPlace.module.css";
import { againstExpectation, kindWords } from "./attributeWords.ts";
import { PricesOver } from "./PricesOver.tsx";

export interface AttributeDetailProps {
  readonly attribute: Attribute;
  readonly appraisal: Appraisal | null;
  readonly isBusy: boolean;
  readonly onChange: () => void;
  readonly onArchive: (archived: boolean) => void;
}

export function AttributeDetail({ attribute, appraisal, isBusy, onChange, onArchive }: AttributeDetailProps) {
  const evidence = appraisal?.report.attributeEvidence.find(({ key }) => key === attribute.key) ?? null;
  const isAgainst = againstExpectation(attribute, appraisal?.report.coefficients ?? []);
  return (
    <section aria-labelledby="attribute-detail">
      <SectionHeading id="attribute-detail" aside={kindWords(attribute)}>
        {attribute.label}
      </SectionHeading>
      <div className={css.detail}>
        <Sentence narrow>{inEvidence(attribute, evidence)}</Sentence>
        {attribute.notes === "" ? null : <p>{attribute.notes}</p>}
        {isAgainst === true ? (
          <Notice>
            In the model at hand the price goes the other way than is expected of it. That can be what it carries for an
            attribute that is left out: the ledger tells.
          </Notice>
        ) : null}
        {evidence !== null && evidence.levels.length > 0 ? <Levels evidence={evidence} /> : null}
        {attribute.kind === "number" || attribute.kind === "built" ? <PricesOver attribute={attribute} /> : null}
        {appraisal === null ? null : <Together attribute={attribute} appraisal={appraisal} />}
        <div className={css.acts}>
          <Button onClick={onChange} disabled={isBusy}>
            Change
          </Button>
          <Button onClick={() => onArchive(!attribute.archived)} disabled={isBusy}>
            {attribute.archived ? "Take back into use" : "Archive"}
          </Button>
          <span className="fine soft">
            {attribute.archived ? "its values were kept" : "archived, it leaves forms and new models; its values stay"}
          </span>
        </div>
      </div>
    </section>
  );
}

/** "Hours in the evidence run from 120 to 11,770; the middle half lies between 2,890 and 5,960." */
export function inEvidence(attribute: Attribute, evidence: AttributeEvidence | null): string {
  if (evidence === null) return `${attribute.label} is not in the reference set of the model at hand.`;
  if (evidence.spread !== null) {
    const { low, high, q1, q3 } = evidence.spread;
    const unit = attribute.kind === "built" ? " years" : attribute.unit === null ? "" : `\u00a0${attribute.unit}`;
    const decimals = attribute.kind === "built" ? 1 : attribute.decimals;
    const number = (value: number): string => formatNumber(value, decimals);
    return `${attribute.label} in the evidence: ${number(low)}–${number(high)}${unit}; the middle half lies between ${number(q1)} and ${number(q3)}.`;
  }
  const total = evidence.levels.reduce((sum, { count }) => sum + count, 0);
  const [first] = [...evidence.levels].sort((a, b) => b.count - a.count);
  if (first === undefined) return `${attribute.label} is not known for any sale in the evidence.`;
  return `${attribute.label} in the evidence: most often ${first.level}, in ${formatNumber(first.count)} of ${formatNumber(total)} sales.`;
}

function Levels({ evidence }: { evidence: AttributeEvidence }) {
  const most = Math.max(1, ...evidence.levels.map(({ count }) => count));
  return (
    <table className={css.levels}>
      <caption className="vh">Sales in the evidence by {lowerStart(evidence.label)}</caption>
      <thead>
        <tr>
          <th scope="col">level</th>
          <th scope="col" className="num">
            sales
          </th>
          <th scope="col">
            <span className="vh">share</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {evidence.levels.map(({ level, count }) => (
          <tr key={level}>
            <th scope="row">
              {level}
              {level === evidence.reference ? <span className="soft"> reference</span> : null}
            </th>
            <td className="num">{formatNumber(count)}</td>
            <td className={css.share}>
              <svg width="160" height="10" aria-hidden="true">
                <rect y="2" width={Math.max(1, (160 * count) / most)} height="6" className="f-mid" />
              </svg>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** The strongest ties of this attribute, with the other attributes alike. */
function Together({ attribute, appraisal }: { attribute: Attribute; appraisal: Appraisal }) {
  const { movingTogether, widening, dependencies, attributeEvidence } = appraisal.report;
  const exact = dependencies.filter(({ attributes }) => attributes.includes(attribute.key));
  const labelOf = (key: string): string => lowerStart(attributeEvidence.find((one) => one.key === key)?.label ?? key);
  const ties = movingTogether.filter(({ a, b }) => a === attribute.key || b === attribute.key).slice(0, 4);
  const wider = widening.find(({ key }) => key === attribute.key) ?? null;
  if (exact.length === 0 && ties.length === 0 && wider === null) return null;
  return (
    <section aria-label="What moves together with it" className={css.together}>
      <SectionHeading aside="the other attributes alike; −1 to 1">Moves together with</SectionHeading>
      {exact.map(({ equation, sentence }) => (
        <Notice key={equation} kind="exact" title={equation}>
          <p>{sentence}</p>
        </Notice>
      ))}
      {ties.length === 0 ? null : (
        <dl className={css.ties}>
          {ties.map(({ a, b, partialCorrelation }) => (
            <div key={`${a} ${b}`}>
              <dt>{labelOf(a === attribute.key ? b : a)}</dt>
              <dd>{formatNumber(partialCorrelation, 2)}</dd>
            </div>
          ))}
        </dl>
      )}
      {wider === null ? null : (
        <p className="soft small">
          Standing beside the others makes the range of its own coefficient {formatNumber(wider.times, 1)} times as
          wide.
        </p>
      )}
    </section>
  );
}
