/** The frame of every screen: header, the place the address names, and the price strip below. Holds the frame's keys. */
import { useCallback, useEffect, useMemo, useState } from "react";
import type { Client } from "../../contract/client.ts";
import { FIRST_PLACE, PLACES, START } from "../routes.ts";
import { PriceStrip } from "../strip/PriceStrip.tsx";
import { type Act, type ActBook, ActBookContext } from "../workbench/acts.ts";
import { WorkbenchProvider } from "../workbench/WorkbenchProvider.tsx";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./Frame.module.css";
import { Header } from "./Header.tsx";
import { Palette } from "./Palette.tsx";
import { goTo, useRoute } from "./useRoute.ts";

export function Frame({ client }: { client: Client }) {
  return (
    <WorkbenchProvider client={client}>
      <Worktable />
    </WorkbenchProvider>
  );
}

function useActBook(): { acts: readonly Act[]; book: ActBook } {
  const [offered, setOffered] = useState<readonly (readonly Act[])[]>([]);
  const book = useMemo<ActBook>(
    () => ({
      offer(acts) {
        setOffered((now) => [...now, acts]);
        return () => setOffered((now) => now.filter((one) => one !== acts));
      },
    }),
    [],
  );
  return { acts: useMemo(() => offered.flat(), [offered]), book };
}

/** A text field keeps its own undo. */
function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement && target.closest("input:not([type=checkbox]):not([type=radio]), textarea") !== null
  );
}

function useFrameKeys(openPalette: () => void): void {
  const { undo, redo } = useWorkbench();
  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      if (!(event.ctrlKey || event.metaKey)) return;
      const key = event.key.toLowerCase();
      if (key === "k") openPalette();
      else if (key === "z" && !isTyping(event.target)) (event.shiftKey ? redo : undo)();
      else return;
      event.preventDefault();
    };
    window.addEventListener("keydown", press);
    return () => window.removeEventListener("keydown", press);
  }, [openPalette, undo, redo]);
}

function Worktable() {
  const { classId } = useWorkbench();
  const { path } = useRoute();
  const { acts, book } = useActBook();
  const [isFinding, setFinding] = useState(false);
  const openPalette = useCallback(() => setFinding(true), []);
  useFrameKeys(openPalette);
  const wanted = PLACES.find((place) => place.path === path) ?? null;
  useEffect(() => {
    if (classId !== null && wanted === null && path !== START.path) goTo(FIRST_PLACE);
  }, [classId, wanted, path]);
  const isReachable = classId !== null || path === "journal";
  const place = wanted !== null && isReachable ? wanted : START;
  useEffect(() => {
    document.title = `${place.label} · Lotwright`;
  }, [place]);
  const Shown = place.component;
  return (
    <ActBookContext value={book}>
      <div className={css.frame}>
        <Header place={place} onFind={openPalette} />
        <main className={css.main} key={`${place.path} ${classId ?? ""}`}>
          <Shown />
        </main>
        <PriceStrip />
        {isFinding ? <Palette placeActs={acts} onClose={() => setFinding(false)} /> : null}
      </div>
    </ActBookContext>
  );
}
