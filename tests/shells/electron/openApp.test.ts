/** The window shell against a recorded Electron: how the window is made, what it refuses, what reaches the core. */
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, beforeEach, describe, expect, test, vi } from "vitest";
import * as electron from "./fakeElectron.ts";

vi.mock("electron", () => electron);

const { openApp } = await import("../../../src/shells/electron/openApp.ts");
const { isOwnAddress, pageResponse } = await import("../../../src/shells/electron/pages.ts");

const home = mkdtempSync(join(tmpdir(), "lotwright-window-"));
let ask: (
  event: unknown,
  name: unknown,
  input: unknown,
) => Promise<{ ok: boolean; value?: unknown; error?: { code: string } }>;

// Counted at once: what a recorder has seen is forgotten between tests.
let sandboxCalls = 0;

beforeAll(async () => {
  vi.stubEnv("LOTWRIGHT_HOME", home);
  await openApp();
  await vi.waitFor(() => expect(electron.FakeWindow.all.length).toBe(1));
  sandboxCalls = electron.app.enableSandbox.mock.calls.length;
  ask = electron.ipcMain.handle.mock.calls[0]![1] as typeof ask;
});
afterAll(() => {
  electron.app.emit("will-quit");
  vi.unstubAllEnvs();
  rmSync(home, { recursive: true, force: true });
});

const page = { senderFrame: { url: "lotwright://app/" } };

describe("the window", () => {
  test("is isolated, sandboxed and without Node in the page, and shows the screens", () => {
    const window = electron.FakeWindow.all[0]!;
    expect(window.options.webPreferences).toMatchObject({
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
      webviewTag: false,
    });
    expect(sandboxCalls).toBe(1);
    expect(window.loaded).toEqual(["lotwright://app/"]);
    expect(window.show).not.toHaveBeenCalled();
    window.emit("ready-to-show");
    expect(window.show).toHaveBeenCalledOnce();
  });

  test("a second start brings the first window forward", () => {
    electron.app.emit("second-instance");
    expect(electron.FakeWindow.all[0]!.restore).toHaveBeenCalled();
    expect(electron.FakeWindow.all[0]!.focus).toHaveBeenCalled();
  });

  test("a second instance quits without opening a store or a window", async () => {
    electron.app.isFirst = false;
    await openApp();
    expect(electron.app.quit).toHaveBeenCalled();
    expect(electron.FakeWindow.all.length).toBe(1);
    electron.app.isFirst = true;
  });
});

describe("what pages may not do", () => {
  const contents = new electron.FakeContents();
  beforeAll(() => electron.app.emit("web-contents-created", {}, contents));

  test("go to another address", () => {
    for (const name of ["will-navigate", "will-redirect"]) {
      for (const url of [
        "https://example.org/",
        "file:///etc/passwd",
        "lotwright://app.example.org/",
        "javascript:1",
      ]) {
        const event = { url, preventDefault: vi.fn() };
        contents.emit(name, event);
        expect(event.preventDefault).toHaveBeenCalledOnce();
      }
      const own = { url: "lotwright://app/#sales", preventDefault: vi.fn() };
      contents.emit(name, own);
      expect(own.preventDefault).not.toHaveBeenCalled();
    }
  });

  test("open windows, attach web views, or be given any permission", () => {
    expect(contents.openHandler!()).toEqual({ action: "deny" });
    const event = { preventDefault: vi.fn() };
    contents.emit("will-attach-webview", event);
    expect(event.preventDefault).toHaveBeenCalled();

    const session = {
      setPermissionRequestHandler: vi.fn(),
      setPermissionCheckHandler: vi.fn(),
      setDevicePermissionHandler: vi.fn(),
    };
    electron.app.emit("session-created", session);
    const answer = vi.fn();
    session.setPermissionRequestHandler.mock.calls[0]![0](null, "media", answer);
    expect(answer).toHaveBeenCalledWith(false);
    expect(session.setPermissionCheckHandler.mock.calls[0]![0]()).toBe(false);
    expect(session.setDevicePermissionHandler.mock.calls[0]![0]()).toBe(false);
  });
});

describe("what reaches the core", () => {
  test("a request of our own page, answered from a real store", async () => {
    expect(await ask(page, "listClasses", {})).toEqual({ ok: true, value: [] });
    expect(existsSync(join(home, "lotwright.sqlite"))).toBe(true);
  });

  test("nothing from another page, and an unknown request is refused as data", async () => {
    expect((await ask({ senderFrame: { url: "https://example.org/" } }, "listClasses", {})).error?.code).toBe(
      "not-allowed",
    );
    expect((await ask({ senderFrame: null }, "listClasses", {})).error?.code).toBe("not-allowed");
    expect((await ask(page, "constructor", {})).error?.code).toBe("no-such-request");
  });

  test("a broken request comes back with the field's name", async () => {
    expect((await ask(page, "listSales", { classId: "one" })).error?.code).toBe("bad-input");
  });
});

describe("saving and printing a sheet", () => {
  const pdf = { fileName: "../up/LW-0001.pdf", bytesBase64: Buffer.from("%PDF-1.7 bytes").toString("base64") };
  beforeEach(() => electron.dialog.showSaveDialog.mockReset());

  test("saves where the person says, and offers a bare file name", async () => {
    const target = join(home, "saved.pdf");
    electron.dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath: target });
    expect(await ask(page, "saveFile", pdf)).toEqual({ ok: true, value: { savedAs: target } });
    expect(readFileSync(target, "utf8")).toBe("%PDF-1.7 bytes");
    expect(electron.dialog.showSaveDialog.mock.calls[0]![0].defaultPath).toBe("LW-0001.pdf");
  });

  test("writes nothing when the person changes their mind, and says why when it can't", async () => {
    electron.dialog.showSaveDialog.mockResolvedValue({ canceled: true, filePath: "" });
    expect(await ask(page, "saveFile", pdf)).toEqual({ ok: true, value: { savedAs: null } });
    electron.dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath: join(home, "no-folder", "x.pdf") });
    expect((await ask(page, "saveFile", pdf)).error?.code).toBe("not-written");
    expect((await ask(page, "saveFile", { fileName: 1 })).error?.code).toBe("bad-input");
  });

  test("prints from a window of its own and leaves no file behind", async () => {
    await ask(page, "printFile", pdf);
    const window = electron.FakeWindow.all.at(-1)!;
    expect(window.options.webPreferences).toMatchObject({
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
    });
    expect(window.webContents.print).toHaveBeenCalledOnce();
    const path = window.loaded[0]!;
    expect(existsSync(path)).toBe(true);
    window.emit("closed");
    await vi.waitFor(() => expect(existsSync(path)).toBe(false));
    electron.FakeWindow.all.pop();
  });
});

describe("the screens' own protocol", () => {
  test("serves our host only, with the content policy", async () => {
    expect(isOwnAddress("lotwright://app/x")).toBe(true);
    expect(isOwnAddress("lotwright://other/x")).toBe(false);
    const missing = await pageResponse("lotwright://app/missing.js", home);
    expect(missing.status).toBe(404);
    expect(missing.headers.get("content-security-policy")).toContain("default-src 'none'");
    expect((await pageResponse("lotwright://other/", home)).status).toBe(404);
  });
});

describe("the preload", () => {
  test("exposes one function and nothing else", async () => {
    await import("../../../src/shells/electron/preload.ts");
    const [name, api] = electron.contextBridge.exposeInMainWorld.mock.calls[0]! as [
      string,
      Record<string, (...args: unknown[]) => unknown>,
    ];
    expect(name).toBe("bridge");
    expect(Object.keys(api)).toEqual(["request"]);
    void api.request!("listClasses", {});
    expect(electron.ipcRenderer.invoke).toHaveBeenCalledWith("request", "listClasses", {});
  });
});
