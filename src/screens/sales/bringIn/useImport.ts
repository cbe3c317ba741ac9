/** A file on its way in: how it is read, what its columns are, and what would come of it; asked anew at each change. */
import { useCallback, useEffect, useMemo, useState } from "react";
import type { ImportPreview } from "../../../contract/requests.ts";
import type { PlainError } from "../../../domain/errors.ts";
import type { ColumnMatch, ReadingOptions } from "../../../domain/importRecord.ts";
import { useRead } from "../../workbench/useTask.ts";
import { useWorkbench } from "../../workbench/workbench.ts";
import type { PickedFile } from "./readFile.ts";

interface Chosen {
  readonly file: PickedFile;
  readonly options: ReadingOptions | null;
  readonly match: ColumnMatch | null;
}

export interface Import {
  readonly file: PickedFile | null;
  readonly options: ReadingOptions | null;
  /** As chosen, ahead of the preview while that is awaited. */
  readonly match: ColumnMatch | null;
  readonly preview: ImportPreview | null;
  readonly error: PlainError | null;
  readonly isAwaited: boolean;
  pick(file: PickedFile | null): void;
  changeOptions(change: Partial<ReadingOptions>): void;
  changeMatch(match: ColumnMatch): void;
}

/** Typing in a field asks once it rests. */
const REST_MS = 220;

/** Other cells are cut out of the file by these, so the columns have to be matched anew. */
const CUTS: readonly (keyof ReadingOptions)[] = ["encoding", "delimiter", "hasHeading"];

function useRested<Value>(value: Value, isAtOnce: boolean): Value {
  const [rested, setRested] = useState(value);
  useEffect(() => {
    const rest = setTimeout(() => setRested(value), isAtOnce ? 0 : REST_MS);
    return () => clearTimeout(rest);
  }, [value, isAtOnce]);
  return rested;
}

export function useImport(classId: number | null): Import {
  const { client } = useWorkbench();
  const [chosen, setChosen] = useState<Chosen | null>(null);
  const rested = useRested(chosen, chosen?.match == null);
  const ask = useMemo(() => {
    if (rested === null) return null;
    const { file, options, match } = rested;
    const { fileName, bytesBase64 } = file;
    type Input = Parameters<typeof client.ask<"previewImport">>[1];
    return () => client.ask("previewImport", { classId, fileName, bytesBase64, options, match } as Input);
  }, [client, classId, rested]);
  const { value: preview, error, isAwaited } = useRead<ImportPreview>(ask);

  const pick = useCallback((file: PickedFile | null) => {
    setChosen(file === null ? null : { file, options: null, match: null });
  }, []);
  const changeOptions = useCallback(
    (change: Partial<ReadingOptions>) => {
      if (preview === null) return;
      const cuts = CUTS.some((name) => name in change);
      setChosen((now) => {
        if (now === null) return now;
        const options = { ...(now.options ?? preview.options), ...change };
        return { ...now, options, match: cuts ? null : now.match };
      });
    },
    [preview],
  );
  const changeMatch = useCallback((match: ColumnMatch) => {
    setChosen((now) => (now === null ? now : { ...now, match }));
  }, []);

  const options = chosen?.options ?? preview?.options ?? null;
  const match = chosen?.match ?? preview?.match ?? null;
  return { file: chosen?.file ?? null, options, match, preview, error, isAwaited, pick, changeOptions, changeMatch };
}
