/**
 * A strict stand-in for Electron: it holds what the desktop host registers, and throws where the real one
 * would refuse. Names and shapes are checked against Electron's own declarations.
 */
import { EventEmitter } from 'node:events';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type * as E from 'electron';

type IpcListener = (event: { senderFrame: unknown }, ...args: unknown[]) => unknown;

interface DoubleState {
  isReady: boolean;
  isSandboxEnabled: boolean;
  hasLock: boolean;
  hasQuit: boolean;
  exitStatus: number | null;
  fireReady: () => void;
  readonly ipcHandlers: Map<string, IpcListener>;
  readonly schemes: E.CustomScheme[];
  readonly protocolHandlers: Map<string, (request: { method: string; url: string }) => Promise<Response>>;
  readonly windows: BrowserWindow[];
  readonly exposed: Map<string, unknown>;
  permissionRequest:
    ((contents: unknown, permission: string, answer: (isAllowed: boolean) => void) => void) | null;
  permissionCheck: ((contents: unknown, permission: string) => boolean) | null;
  devicePermission: (() => boolean) | null;
}

function newState(): DoubleState {
  return {
    isReady: false,
    isSandboxEnabled: false,
    hasLock: true,
    hasQuit: false,
    exitStatus: null,
    fireReady: () => undefined,
    ipcHandlers: new Map(),
    schemes: [],
    protocolHandlers: new Map(),
    windows: [],
    exposed: new Map(),
    permissionRequest: null,
    permissionCheck: null,
    devicePermission: null,
  };
}

let state = newState();
let ready = newReady();

function newReady(): Promise<void> {
  return new Promise((resolve) => {
    state.fireReady = () => {
      state.isReady = true;
      resolve();
    };
  });
}

/** What the code under test did; also fires events that the real Electron would. */
export const double = {
  get state(): DoubleState {
    return state;
  },
  reset(): void {
    state = newState();
    ready = newReady();
    app.removeAllListeners();
    ipcRendererEvents.removeAllListeners();
  },
  /** Sends a call as a frame of a window would. */
  async invoke(channel: string, frame: unknown, ...args: unknown[]): Promise<unknown> {
    const handler = state.ipcHandlers.get(channel);
    if (handler === undefined) throw new Error(`No handler registered for '${channel}'`);
    // Electron copies by structured clone, both ways.
    const answer: unknown = await handler({ senderFrame: frame }, ...args.map((arg) => structuredClone(arg)));
    return structuredClone(answer);
  },
};

const appEvents = new EventEmitter();
export const app = Object.assign(appEvents, {
  whenReady: () => ready,
  enableSandbox(): void {
    if (state.isReady) throw new Error('app.enableSandbox() can only be called before app is ready');
    state.isSandboxEnabled = true;
  },
  requestSingleInstanceLock: () => state.hasLock,
  getPath: (name: string) => join(tmpdir(), 'lampwright-electron-double', name),
  quit(): void {
    state.hasQuit = true;
  },
  exit(status?: number): void {
    state.exitStatus = status ?? 0;
  },
}) satisfies Pick<EventEmitter, 'on'> & {
  [K in 'whenReady' | 'enableSandbox' | 'requestSingleInstanceLock' | 'getPath' | 'quit' | 'exit']: unknown;
};

export const protocol = {
  registerSchemesAsPrivileged(schemes: E.CustomScheme[]): void {
    if (state.isReady)
      throw new Error('protocol.registerSchemesAsPrivileged should be called before app is ready');
    state.schemes.push(...schemes);
  },
  handle(scheme: string, handler: (request: { method: string; url: string }) => Promise<Response>): void {
    if (!state.isReady) throw new Error('protocol.handle needs the app to be ready');
    if (state.protocolHandlers.has(scheme)) throw new Error(`scheme ${scheme} is handled already`);
    state.protocolHandlers.set(scheme, handler);
  },
} satisfies { [K in keyof Pick<E.Protocol, 'registerSchemesAsPrivileged' | 'handle'>]: unknown };

export const session = {
  get defaultSession() {
    if (!state.isReady) throw new Error('Session can only be received when app is ready');
    return {
      setPermissionRequestHandler(handler: NonNullable<DoubleState['permissionRequest']>): void {
        state.permissionRequest = handler;
      },
      setPermissionCheckHandler(handler: NonNullable<DoubleState['permissionCheck']>): void {
        state.permissionCheck = handler;
      },
      setDevicePermissionHandler(handler: () => boolean): void {
        state.devicePermission = handler;
      },
    };
  },
} satisfies { [K in keyof Pick<typeof E.session, 'defaultSession'>]: unknown };

export const ipcMain = {
  handle(channel: string, handler: IpcListener): void {
    if (state.ipcHandlers.has(channel)) {
      throw new Error(`Attempted to register a second handler for '${channel}'`);
    }
    state.ipcHandlers.set(channel, handler);
  },
} satisfies { [K in keyof Pick<E.IpcMain, 'handle'>]: unknown };

class WebContents extends EventEmitter {
  readonly sent: { channel: string; args: unknown[] }[] = [];
  isGone = false;
  windowOpen: ((details: { url: string }) => { action: string }) | null = null;

  setWindowOpenHandler(handler: (details: { url: string }) => { action: string }): void {
    this.windowOpen = handler;
  }
  isDestroyed(): boolean {
    return this.isGone;
  }
  send(channel: string, ...args: unknown[]): void {
    if (this.isGone) throw new TypeError('Object has been destroyed');
    this.sent.push({ channel, args: args.map((arg) => structuredClone(arg)) });
  }
}

export class BrowserWindow extends EventEmitter {
  readonly options: E.BrowserWindowConstructorOptions;
  readonly webContents = new WebContents();
  readonly loadedUrls: string[] = [];
  isShown = false;

  constructor(options: E.BrowserWindowConstructorOptions) {
    super();
    if (!state.isReady) throw new Error('Cannot create BrowserWindow before app is ready');
    this.options = options;
    state.windows.push(this);
  }
  static getAllWindows(): BrowserWindow[] {
    return state.windows;
  }
  loadURL(url: string): Promise<void> {
    this.loadedUrls.push(url);
    return Promise.resolve();
  }
  show(): void {
    this.isShown = true;
  }
  isMinimized(): boolean {
    return false;
  }
  restore(): void {
    this.isShown = true;
  }
  focus(): void {
    this.isShown = true;
  }
}

/** The page's side, for the preload script. */
const ipcRendererEvents = new EventEmitter();
export const ipcRenderer = {
  invoke: (channel: string, ...args: unknown[]): Promise<unknown> =>
    double.invoke(channel, { url: 'app://lampwright/index.html', parent: null }, ...args),
  on: (channel: string, listener: (...args: unknown[]) => void): unknown =>
    ipcRendererEvents.on(channel, listener),
  removeListener: (channel: string, listener: (...args: unknown[]) => void): unknown =>
    ipcRendererEvents.removeListener(channel, listener),
  emit: (channel: string, ...args: unknown[]): boolean => ipcRendererEvents.emit(channel, {}, ...args),
  listenerCount: (channel: string): number => ipcRendererEvents.listenerCount(channel),
} satisfies Record<
  keyof Pick<E.IpcRenderer, 'invoke' | 'on' | 'removeListener' | 'emit' | 'listenerCount'>,
  unknown
>;

export const contextBridge = {
  exposeInMainWorld(name: string, api: unknown): void {
    if (state.exposed.has(name))
      throw new Error(`Cannot bind an API on top of an existing property: ${name}`);
    state.exposed.set(name, api);
  },
} satisfies { [K in keyof Pick<E.ContextBridge, 'exposeInMainWorld'>]: unknown };
