import { bridgeName, callPath, type HostBridge, newsPath } from '../../shared-core/contract/bridge.ts';

/** The host's bridge: what the preload script put on the window, else HTTP to the loopback host. */
export function hostBridge(): HostBridge {
  const onWindow = (window as unknown as Record<string, unknown>)[bridgeName];
  return isBridge(onWindow) ? onWindow : loopbackBridge;
}

const isBridge = (value: unknown): value is HostBridge =>
  typeof value === 'object' && value !== null && 'call' in value && 'on' in value;

const loopbackBridge: HostBridge = {
  async call(name, input) {
    const response = await fetch(callPath + encodeURIComponent(name), {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify(input),
    });
    return (await response.json()) as unknown;
  },
  on(listener) {
    const source = new EventSource(newsPath);
    source.onmessage = (event) => listener(JSON.parse(String(event.data)));
    return () => source.close();
  },
};
