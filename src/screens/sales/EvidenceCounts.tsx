/** How many sales are evidence, and where the others went: each line leads to its sales. */
import type { EvidenceAccount } from "../../domain/appraisal.ts";
import { formatNumber } from "../../domain/format.ts";
import type { PriceModel } from "../../domain/priceModel.ts";
import { Sentence, TextLink } from "../parts/index.ts";
import css from "./EvidencePane.module.css";
import { evidenceSentence, outLines } from "./evidenceState.ts";
import type { SalesFilter } from "./pageBook.ts";

export interface EvidenceCountsProps {
  readonly account: EvidenceAccount;
  readonly model: PriceModel;
  /** "for edition 12", or "now". */
  readonly whose: string;
  readonly onList: (filter: SalesFilter) => void;
}

export function EvidenceCounts({ account, model, whose, onList }: EvidenceCountsProps) {
  const { strong, rest } = evidenceSentence(account);
  return (
    <>
      <Sentence narrow>
        <strong>{strong}</strong>
        {rest}
      </Sentence>
      <dl className={css.counts}>
        <div>
          <dt>{formatNumber(account.read)}</dt>
          <dd>in the register</dd>
        </div>
        {outLines(account, model).map(({ count, words, filter }) => (
          <div key={words}>
            <dt>−{formatNumber(count)}</dt>
            <dd>
              {words}{" "}
              {filter === null ? null : (
                <TextLink onPress={() => onList(filter)} title={`List: ${words}`}>
                  list
                </TextLink>
              )}
            </dd>
          </div>
        ))}
        <div>
          <dt>{formatNumber(account.used)}</dt>
          <dd>in evidence {whose}</dd>
        </div>
      </dl>
    </>
  );
}
