/** The class's attributes: what each is, what is allowed, and how it looks in the evidence. */
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import { type Attribute, CHANNEL_KEY } from "../../domain/attribute.ts";
import type { Subject } from "../../domain/subject.ts";
import { EvidenceHairline } from "../charts/EvidenceHairline.tsx";
import { ageAtSale } from "../sales/columns.ts";
import css from "./AttributesPlace.module.css";
import { allowedWords, directionWords, kindWords, levelWords, stepWords } from "./attributeWords.ts";

export interface AttributeTableProps {
  readonly caption: string;
  readonly attributes: readonly Attribute[];
  readonly evidence: readonly AttributeEvidence[];
  readonly subject: Subject | null;
  readonly openKey: string | null;
  readonly onOpen: (key: string) => void;
}

/** The subject's value as a number on the hairline, or null. */
export function subjectValue(attribute: Attribute, subject: Subject | null): number | null {
  const value = subject?.values[attribute.key];
  if (subject === null || value === undefined || attribute.key === CHANNEL_KEY) return null;
  if (attribute.kind === "built") return ageAtSale(value, subject.effectiveOn);
  return typeof value === "number" ? value : null;
}

export function AttributeTable({ caption, attributes, evidence, subject, openKey, onOpen }: AttributeTableProps) {
  return (
    <table className={css.table}>
      <caption className="vh">{caption}</caption>
      <thead>
        <tr>
          <th scope="col">attribute</th>
          <th scope="col">what it is</th>
          <th scope="col" className={`num ${css.step}`}>
            one more is
          </th>
          <th scope="col" className={`num ${css.allowed}`}>
            allowed
          </th>
          <th scope="col">the price</th>
          <th scope="col">in the evidence</th>
        </tr>
      </thead>
      <tbody>
        {attributes.map((attribute) => {
          const isOpen = attribute.key === openKey;
          return (
            <tr key={attribute.key} className={isOpen ? css.open : undefined}>
              <th scope="row">
                <button
                  type="button"
                  aria-current={isOpen ? "true" : undefined}
                  onClick={() => onOpen(attribute.key)}
                  className={css.name}
                >
                  {attribute.label}
                </button>
              </th>
              <td>{kindWords(attribute)}</td>
              <td className={`num ${css.step}`}>{stepWords(attribute)}</td>
              <td className={`num ${css.allowed}`}>{allowedWords(attribute)}</td>
              <td className="soft">{directionWords(attribute)}</td>
              <td>
                <Evidence
                  attribute={attribute}
                  evidence={evidence.find(({ key }) => key === attribute.key) ?? null}
                  subject={subject}
                />
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

type EvidenceProps = { attribute: Attribute; evidence: AttributeEvidence | null; subject: Subject | null };

function Evidence({ attribute, evidence, subject }: EvidenceProps) {
  if (evidence === null) return <span className="soft">not in the reference set</span>;
  if (evidence.spread === null) return <span className="small">{levelWords(evidence)}</span>;
  return (
    <EvidenceHairline
      label={attribute.label}
      spread={evidence.spread}
      value={subjectValue(attribute, subject)}
      decimals={attribute.kind === "built" ? 1 : attribute.decimals}
      width={150}
    />
  );
}
