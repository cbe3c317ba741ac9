/** Light or dark paper: the person's choice when there is one, else the system's. Kept on this machine only. */
import { useCallback, useEffect, useState } from "react";

export type Theme = "light" | "dark";

const KEY = "lotwright.theme";
const DARK = "(prefers-color-scheme: dark)";

function storedTheme(): Theme {
  const stored = localStorage.getItem(KEY);
  if (stored === "light" || stored === "dark") return stored;
  return matchMedia(DARK).matches ? "dark" : "light";
}

export function applyStoredTheme(): void {
  document.documentElement.dataset.theme = storedTheme();
}

export function useTheme(): { theme: Theme; switchTheme: () => void } {
  const [theme, setTheme] = useState<Theme>(storedTheme);
  useEffect(() => {
    const system = matchMedia(DARK);
    const follow = () => {
      applyStoredTheme();
      setTheme(storedTheme());
    };
    system.addEventListener("change", follow);
    return () => system.removeEventListener("change", follow);
  }, []);
  const switchTheme = useCallback(() => {
    setTheme((now) => {
      const next: Theme = now === "light" ? "dark" : "light";
      localStorage.setItem(KEY, next);
      document.documentElement.dataset.theme = next;
      return next;
    });
  }, []);
  return { theme, switchTheme };
}
