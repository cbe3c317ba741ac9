/** What a screen has to say beside its work: a notice, a question asked in place, nothing here yet, a refusal, a wait. */
import { type ReactNode, useId, useState } from "react";
import { type PlainError, sentenceOf } from "../../domain/errors.ts";
import { Button } from "./Button.tsx";
import css from "./parts.module.css";
import { Sentence } from "./words.tsx";

export interface NoticeProps {
  readonly title?: ReactNode;
  /** exact: an exact dependency (double rule); refusal: brick; plain: brass. */
  readonly kind?: "plain" | "exact" | "refusal";
  readonly children: ReactNode;
}

export function Notice({ title, kind = "plain", children }: NoticeProps) {
  const extra = kind === "exact" ? css.exact : kind === "refusal" ? css.refusal : "";
  return (
    <div className={`${css.notice} ${extra}`}>
      {title === undefined ? null : <div className={css.noticeTitle}>{title}</div>}
      {children}
    </div>
  );
}

export interface InlineAskProps {
  /** "Why is it set aside?" */
  readonly question: string;
  /** The verb: "Set aside". */
  readonly verb: string;
  /** What it will do, before it is done. */
  readonly preview?: ReactNode;
  readonly initial?: string;
  readonly isOptional?: boolean;
  readonly placeholder?: string;
  readonly onAnswer: (answer: string) => void;
  readonly onCancel: () => void;
}

/** Asks for a reason where the work is, never in a window over it. Escape cancels. */
export function InlineAsk(props: InlineAskProps) {
  const { question, verb, preview, initial = "", isOptional = false, placeholder, onAnswer, onCancel } = props;
  const [answer, setAnswer] = useState(initial);
  const id = useId();
  const isReady = isOptional || answer.trim() !== "";
  return (
    <form
      className={css.ask}
      onSubmit={(event) => {
        event.preventDefault();
        if (isReady) onAnswer(answer.trim());
      }}
      onKeyDown={(event) => {
        if (event.key !== "Escape") return;
        event.stopPropagation();
        onCancel();
      }}
    >
      <label htmlFor={id}>{question}</label>
      <div className={css.control}>
        {/* biome-ignore lint/a11y/noAutofocus: the question was called for by the key or click just before */}
        <input id={id} autoFocus value={answer} placeholder={placeholder} onChange={(e) => setAnswer(e.target.value)} />
      </div>
      {preview === undefined ? null : <div className="small">{preview}</div>}
      <div className={css.askActs}>
        <Button type="submit" primary disabled={!isReady}>
          {verb}
        </Button>
        <Button onClick={onCancel}>Cancel</Button>
      </div>
    </form>
  );
}

/** Nothing here yet, and what to do next. */
export function EmptyState({ sentence, children }: { sentence: ReactNode; children?: ReactNode }) {
  return (
    <div className={css.empty}>
      <Sentence narrow>{sentence}</Sentence>
      {children}
    </div>
  );
}

/** What happened, where, and what to do. */
export function ErrorNote({ error, children }: { error: PlainError; children?: ReactNode }) {
  return (
    <div role="alert">
      <Notice kind="refusal">
        <p>{sentenceOf(error)}</p>
        {children}
      </Notice>
    </div>
  );
}

/** A wait in words; drawn only after 150 ms. `done` of `total` where they are known. */
export function Busy({ words, done, total }: { words: string; done?: number; total?: number }) {
  return (
    <div className={css.busy} role="status">
      <span className={css.ring} aria-hidden="true" />
      <span>{words}</span>
      {total === undefined ? null : <progress value={done ?? 0} max={total} />}
    </div>
  );
}
