/** An exact dependency: said in the person's own labels, and resolved by choosing which one stays out. */
import { useId } from "react";
import type { DependencyNotice } from "../../domain/appraisal.ts";
import { lowerStart } from "../../domain/format.ts";
import type { ResolvedWays } from "../../domain/movingTogether.ts";
import { Notice } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { resolveByLeavingOut } from "./modelChanges.ts";
import css from "./PriceModelPlace.module.css";

interface DependencyNoticesProps {
  readonly bench: Workbench;
  readonly dependencies: readonly DependencyNotice[];
  /** Each resolved in every way there is; empty until it is worked out. */
  readonly ways: readonly ResolvedWays[];
}

export function DependencyNotices({ bench, dependencies, ways }: DependencyNoticesProps) {
  return dependencies.map((notice) => (
    <div key={notice.equation} style={{ marginTop: 8 }}>
      <OneNotice
        bench={bench}
        notice={notice}
        shown={ways.find(({ equation }) => equation === notice.equation) ?? null}
      />
    </div>
  ));
}

interface OneNoticeProps {
  readonly bench: Workbench;
  readonly notice: DependencyNotice;
  readonly shown: ResolvedWays | null;
}

function OneNotice({ bench, notice, shown }: OneNoticeProps) {
  const name = useId();
  const keys = notice.choices.map((choice) => choice.key);
  return (
    <Notice kind="exact" title={notice.equation}>
      <p>{notice.sentence}</p>
      <fieldset className={css.choices}>
        <legend className="vh">Which one to leave out</legend>
        {notice.choices.map((choice) => {
          const isOut = notice.resolvedBy?.key === choice.key;
          const byProgram = isOut && notice.resolvedBy?.chosenBy === "program";
          return (
            <label key={choice.key}>
              <input
                type="radio"
                name={name}
                checked={isOut}
                onChange={() => bench.changeModel((now) => resolveByLeavingOut(now, keys, choice.key))}
              />
              <span>
                Leave out {lowerStart(choice.label)}
                {byProgram ? <span className="soft"> (the program chose; choose another if you like)</span> : null}
              </span>
            </label>
          );
        })}
      </fieldset>
      {shown === null || shown.sentence === "" ? null : <p className="soft">{shown.sentence}</p>}
    </Notice>
  );
}
