/** Light or dark paper: the person's choice when there is one, else the system's. Kept on this machine only. */
import { useCallback, useState } from "react";

export type Theme = "light" | "dark";

const KEY = "lotwright.theme";

function storedTheme(): Theme {
  const stored = localStorage.getItem(KEY);
  if (stored === "light" || stored === "dark") return stored;
  return matchMedia("(prefers-color-scheme: dark)").matches ? "dark" : "light";
}

export function applyStoredTheme(): void {
  document.documentElement.dataset.theme = storedTheme();
}

export function useTheme(): { theme: Theme; switchTheme: () => void } {
  const [theme, setTheme] = useState<Theme>(storedTheme);
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
