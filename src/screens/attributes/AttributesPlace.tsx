/** Attributes: the class's definitions on the left; on the right the one that is looked at, or its form. */
import { useMemo, useState } from "react";
import type { AssetClass } from "../../domain/assetClass.ts";
import type { Attribute } from "../../domain/attribute.ts";
import { formatNumber } from "../../domain/format.ts";
import { Busy, Button, EmptyState, ErrorNote, PaneLayout, SectionHeading } from "../parts/index.ts";
import { useActs } from "../workbench/acts.ts";
import { useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import { AttributeDetail } from "./AttributeDetail.tsx";
import { AttributeForm } from "./AttributeForm.tsx";
import css from "./AttributesPlace.module.css";
import { AttributeTable } from "./AttributeTable.tsx";

/** What the right side shows: one attribute, its form, or the form of a new one. */
type Shown = { readonly key: string; readonly isForm: boolean } | "new";

export function AttributesPlace() {
  const { assetClass, error } = useWorkbench();
  if (assetClass === null) return error === null ? <Busy words="Opening the class …" /> : <ErrorNote error={error} />;
  return <Definitions assetClass={assetClass} />;
}

function Definitions({ assetClass }: { assetClass: AssetClass }) {
  const { client, appraisal, subject, reload } = useWorkbench();
  const { id: classId, attributes } = assetClass;
  const used = attributes.filter(({ archived }) => !archived);
  const archived = attributes.filter((one) => one.archived);
  const [shown, setShown] = useState<Shown | null>(used[0] === undefined ? null : { key: used[0].key, isForm: false });
  const task = useTask();
  useActs(useMemo(() => [{ label: "Add an attribute", run: () => setShown("new") }], []));

  const open = shown === null || shown === "new" ? null : (attributes.find(({ key }) => key === shown.key) ?? null);
  const write = (work: () => Promise<unknown>, key: string): void => {
    void task.run(async () => {
      await work();
      await reload();
      setShown({ key, isForm: false });
    });
  };
  const keep = (attribute: Attribute): void =>
    write(
      () =>
        open === null
          ? client.ask("addAttribute", { classId, attribute: input(attribute) })
          : client.ask("changeAttribute", { classId, key: open.key, attribute: input(attribute) }),
      attribute.key,
    );
  const table = (caption: string, some: readonly Attribute[]) => (
    <AttributeTable
      caption={caption}
      attributes={some}
      evidence={appraisal?.report.attributeEvidence ?? []}
      subject={subject}
      openKey={open?.key ?? null}
      onOpen={(key) => {
        task.clear();
        setShown({ key, isForm: false });
      }}
    />
  );
  return (
    <PaneLayout
      name="attributes"
      rightWidth={480}
      leftLabel="Attributes"
      rightLabel="One attribute"
      left={
        <div className={css.left}>
          <div className={css.top}>
            <h1>
              {formatNumber(used.length)} {used.length === 1 ? "attribute" : "attributes"} of a {assetClass.itemWord}
            </h1>
            <Button onClick={() => setShown("new")}>Add attribute</Button>
          </div>
          {used.length === 0 ? (
            <EmptyState sentence="No attributes yet. Add one here, or bring in a file: its columns can become attributes." />
          ) : (
            table("Attributes in use", used)
          )}
          {archived.length === 0 ? null : (
            <section className={css.archived}>
              <SectionHeading aside="out of forms and new models; their values are kept">Archived</SectionHeading>
              {table("Archived attributes", archived)}
            </section>
          )}
        </div>
      }
      right={
        <>
          {task.error === null ? null : <ErrorNote error={task.error} />}
          {shown === "new" || (open !== null && shown?.isForm) ? (
            <AttributeForm
              key={open?.key ?? "new"}
              attribute={open}
              all={attributes}
              isBusy={task.isRunning}
              onKeep={keep}
              onCancel={() => setShown(open === null ? firstOf(used) : { key: open.key, isForm: false })}
            />
          ) : open !== null ? (
            <AttributeDetail
              attribute={open}
              appraisal={appraisal}
              isBusy={task.isRunning}
              onChange={() => setShown({ key: open.key, isForm: true })}
              onArchive={(isArchived) =>
                write(() => client.ask("archiveAttribute", { classId, key: open.key, archived: isArchived }), open.key)
              }
            />
          ) : (
            <EmptyState sentence="Choose an attribute on the left to see how it lies in the evidence." />
          )}
        </>
      }
    />
  );
}

function firstOf(attributes: readonly Attribute[]): Shown | null {
  return attributes[0] === undefined ? null : { key: attributes[0].key, isForm: false };
}

/** The contract's lists are plain arrays. */
function input(attribute: Attribute) {
  return { ...attribute, levels: [...attribute.levels] };
}
