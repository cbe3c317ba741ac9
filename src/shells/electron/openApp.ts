/** The Electron process: one instance, one window, the screens on a protocol of their own, and one channel to the core. */
import { app, BrowserWindow, ipcMain, protocol } from "electron";
import { usualStorePath } from "../dataFolder.ts";
import { openWorkshop } from "../openWorkshop.ts";
import { sumOnThreads } from "../sumOnThreads.ts";
import { answerFromPage } from "./answerFromPage.ts";
import { APP_SCHEME, servePages } from "./pages.ts";
import { refuseEverywhere } from "./refusals.ts";
import { openWindow } from "./window.ts";

/** Resolves once the window is asked for; quits at once when another instance already holds the store. */
export async function openApp(): Promise<void> {
  if (!app.requestSingleInstanceLock()) {
    app.quit();
    return;
  }
  // "standard" gives the pages an origin and relative addresses; "secure" the features of an https page.
  protocol.registerSchemesAsPrivileged([
    { scheme: APP_SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ]);
  app.enableSandbox();
  refuseEverywhere(app);
  app.on("second-instance", () => {
    const window = BrowserWindow.getAllWindows()[0];
    if (window?.isMinimized()) window.restore();
    window?.focus();
  });
  app.on("window-all-closed", () => app.quit());
  // Electron holds "ready" back until the entry module has run, so this must not be awaited in it.
  void app.whenReady().then(start);
}

function start(): void {
  sumOnThreads();
  const workshop = openWorkshop({ storePath: usualStorePath() });
  app.on("will-quit", () => workshop.close());
  servePages(protocol);
  ipcMain.handle("request", (event, name: unknown, input: unknown) =>
    answerFromPage(workshop.ask, event.senderFrame?.url ?? "", String(name), input),
  );
  openWindow();
  app.on("activate", () => {
    if (BrowserWindow.getAllWindows().length === 0) openWindow();
  });
}
