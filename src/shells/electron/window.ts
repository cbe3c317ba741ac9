/** The one window: isolated, sandboxed, without Node in the page, shown once it is drawn. */
import { BrowserWindow } from "electron";
import { iconFile, preloadFile } from "../programFiles.ts";
import { START_PAGE } from "./pages.ts";

export function openWindow(): BrowserWindow {
  const window = new BrowserWindow({
    width: 1360,
    height: 860,
    minWidth: 720,
    minHeight: 520,
    show: false,
    title: "Lotwright",
    icon: iconFile(),
    autoHideMenuBar: true,
    webPreferences: {
      preload: preloadFile(),
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
      webviewTag: false,
      // Chromium's PDF viewer counts as a plugin; without it the sheet's preview stays empty.
      plugins: true,
      spellcheck: false,
    },
  });
  window.once("ready-to-show", () => window.show());
  void window.loadURL(START_PAGE);
  return window;
}
