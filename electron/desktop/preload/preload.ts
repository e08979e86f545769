import { contextBridge, ipcRenderer } from 'electron';
import {
  bridgeName,
  callChannel,
  type HostBridge,
  newsChannel,
} from '../../../shared-core/contract/bridge.ts';

// The page gets two functions and no channel names: whatever runs in it can ask for services, nothing else.
const bridge: HostBridge = {
  call: (name, input) => ipcRenderer.invoke(callChannel, name, input),
  on(listener) {
    const forward = (_event: unknown, news: unknown): void => listener(news);
    ipcRenderer.on(newsChannel, forward);
    return () => void ipcRenderer.removeListener(newsChannel, forward);
  },
};

contextBridge.exposeInMainWorld(bridgeName, bridge);
