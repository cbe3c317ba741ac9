/** The files of demo-db/: what `demoClasses` brings in, the weekly list for trying the import out, and the subjects. */
import { demoClasses, demoWeeklyFile } from "./demoClasses.ts";
import { utf8 } from "./tableText.ts";

export interface DemoFile {
  readonly fileName: string;
  readonly bytes: Uint8Array;
}

function jsonFile(fileName: string, value: unknown): DemoFile {
  return { fileName, bytes: utf8(`${JSON.stringify(value, null, 2)}\n`) };
}

/** All of them but the README, in a fixed order. */
export function demoFiles(): readonly DemoFile[] {
  const classes = demoClasses();
  const [first, second] = classes;
  return [
    ...classes.map(({ fileName, bytes }) => ({ fileName, bytes })),
    demoWeeklyFile(),
    jsonFile("subject.json", first!.subject),
    jsonFile("reed-organ-subject.json", second!.subject),
  ];
}
