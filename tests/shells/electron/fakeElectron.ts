/** What the window shell uses of Electron, recorded instead of done: its binary is not needed to test our side of it. */
import { vi } from "vitest";

type Listener = (...args: unknown[]) => unknown;

/** Listeners by event name, and a way to call them. */
export class Emitter {
  readonly listeners = new Map<string, Listener[]>();
  on(name: string, listener: Listener): this {
    this.listeners.set(name, [...(this.listeners.get(name) ?? []), listener]);
    return this;
  }
  once(name: string, listener: Listener): this {
    return this.on(name, listener);
  }
  emit(name: string, ...args: unknown[]): void {
    for (const listener of this.listeners.get(name) ?? []) listener(...args);
  }
}

export class FakeContents extends Emitter {
  openHandler: (() => { action: string }) | null = null;
  readonly print = vi.fn();
  setWindowOpenHandler(handler: () => { action: string }): void {
    this.openHandler = handler;
  }
}

export class FakeWindow extends Emitter {
  static all: FakeWindow[] = [];
  static getAllWindows = (): FakeWindow[] => FakeWindow.all;
  readonly options: { webPreferences: Record<string, unknown> };
  readonly webContents = new FakeContents();
  readonly loaded: string[] = [];
  readonly show = vi.fn();
  readonly focus = vi.fn();
  readonly restore = vi.fn();
  isMinimized = (): boolean => true;
  constructor(options: { webPreferences: Record<string, unknown> }) {
    super();
    this.options = options;
    FakeWindow.all.push(this);
  }
  loadURL = async (address: string): Promise<void> => void this.loaded.push(address);
  loadFile = async (path: string): Promise<void> => void this.loaded.push(path);
}

class FakeApp extends Emitter {
  isFirst = true;
  readonly quit = vi.fn();
  readonly enableSandbox = vi.fn();
  requestSingleInstanceLock = (): boolean => this.isFirst;
  whenReady = (): Promise<void> => Promise.resolve();
}

export const app = new FakeApp();
export const ipcMain = { handle: vi.fn<(name: string, listener: Listener) => void>() };
export const protocol = {
  registerSchemesAsPrivileged: vi.fn(),
  handle: vi.fn<(scheme: string, answer: (request: { url: string }) => Promise<Response>) => void>(),
};
export const dialog = { showSaveDialog: vi.fn() };
export const contextBridge = { exposeInMainWorld: vi.fn<(name: string, api: unknown) => void>() };
export const ipcRenderer = { invoke: vi.fn() };
export const BrowserWindow = FakeWindow;
