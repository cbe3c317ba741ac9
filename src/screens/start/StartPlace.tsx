/** The two doors: open the demo class, or start a class from a file of sales. */
import { useState } from "react";
import { formatNumber } from "../../domain/format.ts";
import { goTo, useRoute } from "../frame/useRoute.ts";
import { Button, ErrorNote, Sentence, TextLink } from "../parts/index.ts";
import { FIRST_PLACE } from "../routes.ts";
import { FileDoor } from "../sales/bringIn/FileDoor.tsx";
import { type PickedFile, readFile } from "../sales/bringIn/readFile.ts";
import { useTask } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import { StartFromFile } from "./StartFromFile.tsx";
import css from "./StartPlace.module.css";

export function StartPlace() {
  const [file, setFile] = useState<PickedFile | null>(null);
  if (file !== null) return <StartFromFile file={file} onBack={() => setFile(null)} />;
  return <Doors onFile={setFile} />;
}

function Doors({ onFile }: { onFile: (file: PickedFile) => void }) {
  const { client, classes, openClass, error } = useWorkbench();
  const task = useTask();
  const openDemo = (): void => {
    void task.run(async () => {
      const { classId } = await client.ask("openDemo", {});
      await openClass(classId);
      goTo(FIRST_PLACE);
    });
  };
  return (
    <div className={css.start}>
      <h1>Price one used item from the sales of others like it</h1>
      <Sentence>
        Bring in comparable sales, choose which attributes count, and read the price with its range, what each attribute
        carries, and which sales made it.
      </Sentence>
      {error === null ? null : <ErrorNote error={error} />}
      {task.error === null ? null : <ErrorNote error={task.error} />}
      <div className={css.doors}>
        <section className={css.door} aria-labelledby="door-demo">
          <h2 id="door-demo">Open the demo class</h2>
          <p>
            Telehandlers: 640 sales over three years, with age and hours that rise together, power recorded twice, and a
            week’s list to bring in. Everything in it is invented.
          </p>
          <Button primary onClick={openDemo} disabled={task.isRunning}>
            {task.isRunning ? "Opening the demo class …" : "Open the demo class"}
          </Button>
        </section>
        <section className={css.door} aria-labelledby="door-file">
          <h2 id="door-file">Start a class from a file</h2>
          <p>
            A list of sales with one sale a row: price, day, and whatever else is known. You see how it is read before
            anything is kept.
          </p>
          <FileDoor
            words="Pick a file, or drop it here"
            note="CSV, or another list as text"
            accept=".csv,.tsv,.txt,text/csv,text/plain"
            onFile={(file) => void task.run(async () => onFile(await readFile(file)))}
          />
        </section>
      </div>
      <Classes classes={classes} />
      <p className="soft small">
        A model price is an aid to a valuer’s judgement, not an inspection: condition, safety, title and authenticity
        are not seen by it. Everything stays on this machine.
      </p>
    </div>
  );
}

function Classes({ classes }: Pick<ReturnType<typeof useWorkbench>, "classes">) {
  const { openClass } = useWorkbench();
  const { path } = useRoute();
  if (classes.length === 0) return null;
  return (
    <p>
      {path === "start" ? "Or go on with " : "Go on with "}
      {classes.map((one, at) => (
        <span key={one.id}>
          {at === 0 ? "" : ", "}
          <TextLink onPress={() => void openClass(one.id).then(() => goTo(FIRST_PLACE))}>{one.name}</TextLink>{" "}
          <span className="soft small">{formatNumber(one.saleCount)} sales</span>
        </span>
      ))}
      .
    </p>
  );
}
