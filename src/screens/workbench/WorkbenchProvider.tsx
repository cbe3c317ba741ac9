/** Holds the workbench: opens classes, keeps the history of changes, asks for the price and remembers the draft. */
import { type ReactNode, useCallback, useEffect, useMemo, useState } from "react";
import type { Client } from "../../contract/client.ts";
import type { RequestInput } from "../../contract/requests.ts";
import type { AssetClassSummary } from "../../domain/assetClass.ts";
import type { PlainError } from "../../domain/errors.ts";
import type { Engagement } from "../../domain/subject.ts";
import { type History, record, redo, startHistory, undo } from "./history.ts";
import { type ClassFacts, isEditionCurrent, readClass, readDraft } from "./openedClass.ts";
import { sameModel } from "./sameModel.ts";
import { LEVELS, plainErrorOf, useAppraisal } from "./useAppraisal.ts";
import { useDraft } from "./useDraft.ts";
import { type Status, type Workbench, WorkbenchContext } from "./workbench.ts";

const LAST_CLASS = "lotwright.class";

interface Opened {
  readonly facts: ClassFacts;
  readonly engagement: Engagement;
  readonly history: History;
  readonly leftOutJustNow: string | null;
  /** Null while it is being found out. */
  readonly editionIsCurrent: boolean | null;
  readonly stamp: number;
}

/** What changes by hand replaces the model; an untouched one follows the class. */
function refreshed(opened: Opened, facts: ClassFacts): Opened {
  const { now } = opened.history;
  const isUntouched = sameModel(now.model, opened.facts.baseModel);
  const history =
    isUntouched && !sameModel(now.model, facts.baseModel)
      ? { ...opened.history, now: { ...now, model: facts.baseModel } }
      : opened.history;
  return { ...opened, facts, history, editionIsCurrent: null, stamp: opened.stamp + 1 };
}

export function WorkbenchProvider({ client, children }: { client: Client; children: ReactNode }) {
  const [classes, setClasses] = useState<readonly AssetClassSummary[]>([]);
  const [opened, setOpened] = useState<Opened | null>(null);
  const [openError, setOpenError] = useState<PlainError | null>(null);
  const [level, setLevel] = useState(0.9);

  const classId = opened?.facts.assetClass.id ?? null;
  const work = opened?.history.now ?? null;
  const answer = useAppraisal(client, classId, work, opened?.stamp ?? 0);
  useDraft(client, classId, work?.subject ?? null, opened?.engagement ?? null);

  const openClass = useCallback(
    async (id: number) => {
      try {
        const [facts, draft, list] = await Promise.all([
          readClass(client, id),
          readDraft(client, id),
          client.ask("listClasses", {}),
        ]);
        localStorage.setItem(LAST_CLASS, String(id));
        setClasses(list);
        setOpenError(null);
        setOpened({
          facts,
          engagement: draft.engagement,
          history: startHistory({ model: facts.baseModel, subject: draft.subject }),
          leftOutJustNow: null,
          editionIsCurrent: null,
          stamp: 0,
        });
      } catch (cause) {
        setOpenError(plainErrorOf(cause));
      }
    },
    [client],
  );

  useEffect(() => {
    void (async () => {
      try {
        const list = await client.ask("listClasses", {});
        setClasses(list);
        const last = Number(localStorage.getItem(LAST_CLASS));
        const first = list.find((one) => one.id === last) ?? list[0];
        if (first !== undefined) await openClass(first.id);
      } catch (cause) {
        setOpenError(plainErrorOf(cause));
      }
    })();
  }, [client, openClass]);

  const reload = useCallback(async () => {
    const list = await client.ask("listClasses", {});
    setClasses(list);
    if (classId === null) return;
    const facts = await readClass(client, classId);
    setOpened((now) => (now?.facts.assetClass.id === classId ? refreshed(now, facts) : now));
  }, [client, classId]);

  const edition = opened?.facts.edition ?? null;
  const mustCheck = opened !== null && opened.editionIsCurrent === null;
  useEffect(() => {
    if (!mustCheck || edition === null || classId === null) return;
    let isWanted = true;
    const settle = (isCurrent: boolean): void => {
      if (isWanted) setOpened((now) => (now === null ? now : { ...now, editionIsCurrent: isCurrent }));
    };
    isEditionCurrent(client, classId, edition).then(settle, () => settle(false));
    return () => {
      isWanted = false;
    };
  }, [client, classId, edition, mustCheck]);

  const changeModel = useCallback<Workbench["changeModel"]>((change) => {
    setOpened((now) => {
      if (now === null) return now;
      const { model, subject } = now.history.now;
      const next = change(model);
      if (next === model) return now;
      const leftOutJustNow = next.leftOut.find((key) => !model.leftOut.includes(key)) ?? null;
      return { ...now, history: record(now.history, { model: next, subject }, null), leftOutJustNow };
    });
  }, []);

  const changeSubject = useCallback<Workbench["changeSubject"]>((change, field) => {
    setOpened((now) => {
      if (now === null) return now;
      const { model, subject } = now.history.now;
      const next = change(subject);
      if (next === subject) return now;
      return { ...now, history: record(now.history, { model, subject: next }, field ?? null) };
    });
  }, []);

  const changeEngagement = useCallback<Workbench["changeEngagement"]>((change) => {
    setOpened((now) => (now === null ? now : { ...now, engagement: change(now.engagement) }));
  }, []);

  const stepBack = useCallback(() => {
    setOpened((now) => (now === null ? now : { ...now, history: undo(now.history), leftOutJustNow: null }));
  }, []);
  const stepForward = useCallback(() => {
    setOpened((now) => (now === null ? now : { ...now, history: redo(now.history), leftOutJustNow: null }));
  }, []);

  const model = work?.model ?? null;
  const saveEdition = useCallback(async () => {
    const saved = await client.ask("saveEdition", { classId, model } as RequestInput<"saveEdition">);
    const list = await client.ask("listClasses", {});
    setClasses(list);
    setOpened((now) => {
      if (now === null) return now;
      const summary = list.find((one) => one.id === classId) ?? now.facts.summary;
      const facts = { ...now.facts, summary, edition: saved, baseModel: saved.model };
      return { ...now, facts, editionIsCurrent: true, leftOutJustNow: null };
    });
    return saved;
  }, [client, classId, model]);

  const workbench = useMemo<Workbench>(() => {
    const isSaved =
      opened !== null &&
      model !== null &&
      edition !== null &&
      sameModel(model, edition.model) &&
      opened.editionIsCurrent !== false;
    const settled: Status = isSaved ? "saved" : "changed";
    const status: Status = answer.isWaiting ? "refitting" : answer.error !== null ? "notPriced" : settled;
    return {
      client,
      classes,
      classId,
      assetClass: opened?.facts.assetClass ?? null,
      summary: opened?.facts.summary ?? null,
      model,
      edition,
      subject: work?.subject ?? null,
      engagement: opened?.engagement ?? null,
      levels: LEVELS,
      level,
      appraisal: answer.appraisal,
      milliseconds: answer.milliseconds,
      glanced: answer.glanced,
      move: answer.move,
      status,
      error: answer.error ?? openError,
      canUndo: (opened?.history.past.length ?? 0) > 0,
      canRedo: (opened?.history.future.length ?? 0) > 0,
      leftOutJustNow: opened?.leftOutJustNow ?? null,
      changeModel,
      changeSubject,
      changeEngagement,
      setLevel,
      undo: stepBack,
      redo: stepForward,
      saveEdition,
      reload,
      openClass,
    };
  }, [
    answer,
    changeEngagement,
    changeModel,
    changeSubject,
    classId,
    classes,
    client,
    edition,
    level,
    model,
    openClass,
    openError,
    opened,
    reload,
    saveEdition,
    stepBack,
    stepForward,
    work,
  ]);

  return <WorkbenchContext value={workbench}>{children}</WorkbenchContext>;
}
