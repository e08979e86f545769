import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { createClient } from '../../shared-core/contract/client.ts';
import { lampwright } from '../support/command.ts';
import { openDesktopHost, openLoopbackHost } from '../support/open-hosts.ts';
import { projectRoot } from '../support/source-files.ts';

/** The demo as a person would hand it over: every file named. */
async function demoByHand(): Promise<{ recording: string; json: string }> {
  const demo = join(projectRoot, 'assets', 'demo');
  const listed = JSON.parse((await lampwright('diagnose', demo, '--json')).out) as {
    recording: { name: string };
  }[];
  const recording = join(demo, listed[0]?.recording.name ?? '');
  const { out } = await lampwright('diagnose', recording, '--bench', join(demo, 'bench.json'), '--json');
  return { recording, json: out.trimEnd() };
}

test.each([
  ['loopback', openLoopbackHost],
  ['desktop', openDesktopHost],
])('the %s host and the command give the same diagnosis, byte for byte', async (_name, open) => {
  const { recording, json } = await demoByHand();
  const host = await open();
  try {
    const client = createClient(host.bridge);
    const demo = await client.call('demo.open', {});
    if (!demo.ok) throw new Error(demo.problem.found);
    const without = (file: { name: string; bytesBase64: string } | null) =>
      file && { name: file.name, bytesBase64: file.bytesBase64 };
    expect(demo.value.recording.bytesBase64).toBe(readFileSync(recording).toString('base64'));
    const reply = await client.call('diagnosis.run', {
      recording: { name: demo.value.recording.name, bytesBase64: demo.value.recording.bytesBase64 },
      dark: without(demo.value.dark),
      response: without(demo.value.response),
      bench: without(demo.value.bench),
      options: { leftOut: [] },
    });
    expect(reply.ok ? reply.value.diagnosisJson : reply.problem.found).toBe(json);
  } finally {
    await host.close();
  }
});

test('the demo holds its bench file, dark and response beside the recording', () => {
  const names = readdirSync(join(projectRoot, 'assets', 'demo'));
  expect(names).toContain('bench.json');
  expect(names.length).toBeGreaterThanOrEqual(4);
});
