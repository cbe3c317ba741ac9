/** Where you are, from the address: "#/price-model" or "#/appraise/pull" (a place and its sub-place). */
import { useSyncExternalStore } from "react";

export interface Route {
  readonly path: string;
  readonly sub: string | null;
}

export function routeOf(hash: string): Route {
  const [path = "", sub = ""] = hash.replace(/^#\/?/, "").split("/");
  return { path, sub: sub === "" ? null : sub };
}

export function hrefOf(path: string, sub: string | null = null): string {
  return sub === null ? `#/${path}` : `#/${path}/${sub}`;
}

export function goTo(path: string, sub: string | null = null): void {
  window.location.hash = hrefOf(path, sub);
}

function subscribe(tell: () => void): () => void {
  window.addEventListener("hashchange", tell);
  return () => window.removeEventListener("hashchange", tell);
}

export function useRoute(): Route {
  return routeOf(
    useSyncExternalStore(
      subscribe,
      () => window.location.hash,
      () => "",
    ),
  );
}
