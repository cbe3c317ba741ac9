/** What no page of this program may do: go elsewhere, open windows, attach web views, or ask for the machine's devices. */
import type { App, Session, WebContents } from "electron";
import { isOwnAddress } from "./pages.ts";

export function refuseFor(contents: WebContents): void {
  contents.on("will-navigate", (event) => {
    if (!isOwnAddress(event.url)) event.preventDefault();
  });
  contents.on("will-redirect", (event) => {
    if (!isOwnAddress(event.url)) event.preventDefault();
  });
  contents.on("will-attach-webview", (event) => event.preventDefault());
  contents.setWindowOpenHandler(() => ({ action: "deny" }));
}

export function refusePermissions(session: Session): void {
  session.setPermissionRequestHandler((_contents, _permission, answer) => answer(false));
  session.setPermissionCheckHandler(() => false);
  session.setDevicePermissionHandler(() => false);
}

/** For every page and session that ever comes to be, the print window included. */
export function refuseEverywhere(app: App): void {
  app.on("session-created", (session) => refusePermissions(session));
  app.on("web-contents-created", (_event, contents) => refuseFor(contents));
}
