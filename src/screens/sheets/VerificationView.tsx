/** What verifying a sheet says: the verdict in a sentence, what was compared, each problem, and every figure. */
import { useCallback, useState } from "react";
import type { Client } from "../../contract/client.ts";
import { formatNumber } from "../../domain/format.ts";
import type { VerificationReport, VerifiedFigure } from "../../domain/sheetRecord.ts";
import { Busy, Button, ErrorNote, Notice, SectionHeading, SegmentedChoice } from "../parts/index.ts";
import { useRead } from "../workbench/useTask.ts";
import css from "./Sheets.module.css";

const PAGE = 60;

export function VerificationView({ client, bytesBase64 }: { readonly client: Client; readonly bytesBase64: string }) {
  const ask = useCallback(() => client.ask("verifySheet", { bytesBase64 }), [client, bytesBase64]);
  const { value, error } = useRead(ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null) return <Busy words="Working the sheet out again" />;
  return <Verified report={value} />;
}

export function Verified({ report }: { readonly report: VerificationReport }) {
  return (
    <section aria-label="Verification" className={css.verified}>
      <div role="status">
        <Notice kind={report.verdict === "stands" ? "plain" : "refusal"} title={report.sentence}>
          <ul className={css.checks}>
            <Check isGood={report.bytesIntact} good="no byte was changed" bad="bytes were changed" />
            <Check
              isGood={report.fingerprintEqual}
              good="the evidence is the fingerprinted one"
              bad="the evidence is another"
            />
            <Check
              isGood={report.textEqual}
              good="the pages say what the result says"
              bad="the pages say something else"
            />
            <Check
              isGood={report.differentCount === 0}
              good={`${formatNumber(report.equalCount)} figures came out again to the last bit`}
              bad={`${formatNumber(report.differentCount)} figures differ`}
            />
            {report.knownToJournal === null ? null : (
              <Check
                isGood={report.knownToJournal}
                good="the journal here knows it"
                bad="the journal here does not know it"
              />
            )}
          </ul>
          {report.sameProgramVersion ? null : (
            <p>It was issued by version {report.programVersion ?? "unknown"} of the program.</p>
          )}
        </Notice>
      </div>
      {report.problems.length === 0 ? null : (
        <ul className={css.problems}>
          {report.problems.map((problem) => (
            <li key={problem}>{problem}</li>
          ))}
        </ul>
      )}
      {report.figures.length === 0 ? null : <Figures figures={report.figures} />}
    </section>
  );
}

function Check({ isGood, good, bad }: { readonly isGood: boolean; readonly good: string; readonly bad: string }) {
  return (
    <li className={isGood ? undefined : "brick"}>
      <span aria-hidden="true">{isGood ? "●" : "○"}</span> {isGood ? good : bad}
    </li>
  );
}

function Figures({ figures }: { readonly figures: readonly VerifiedFigure[] }) {
  const [isAll, setIsAll] = useState(figures.every((one) => one.equal));
  const [count, setCount] = useState(PAGE);
  const wanted = isAll ? figures : figures.filter((one) => !one.equal);
  return (
    <>
      <SectionHeading
        aside={
          <SegmentedChoice
            label="Which figures"
            options={[
              { value: true, label: "all" },
              { value: false, label: "different only" },
            ]}
            value={isAll}
            onChoose={setIsAll}
          />
        }
      >
        Figures
      </SectionHeading>
      <table className={css.figures}>
        <caption className="vh">Figures in the sheet and worked out again</caption>
        <thead>
          <tr>
            <th scope="col">figure</th>
            <th scope="col" className="num">
              in the sheet
            </th>
            <th scope="col" className="num">
              worked out again
            </th>
            <th scope="col">verdict</th>
          </tr>
        </thead>
        <tbody>
          {wanted.slice(0, count).map((one) => (
            <tr key={one.name}>
              <th scope="row">{one.name}</th>
              <td className="num">{one.printed === null ? "none" : String(one.printed)}</td>
              <td className="num">{one.recomputed === null ? "none" : String(one.recomputed)}</td>
              <td className={one.equal ? "soft" : "brick"}>{one.equal ? "equal" : "different"}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {wanted.length > count ? (
        <Button onClick={() => setCount(count + 10 * PAGE)}>{`Show more of the ${formatNumber(wanted.length)}`}</Button>
      ) : null}
    </>
  );
}
