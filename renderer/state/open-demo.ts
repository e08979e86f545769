import type { Dispatch } from 'react';
import type { Client } from '../../shared-core/contract/client.ts';
import type { SentFile } from '../../shared-core/contract/service-table.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import type { Problem } from '../../shared-core/result/result.ts';
import { fromSent } from '../client/files.ts';
import { emptySlots } from './inputs.ts';
import type { SheetAction } from './sheet-state.ts';

/** Asks the host for the demo recording and the files that belong to it. */
export async function openDemo(client: Client, dispatch: Dispatch<SheetAction>): Promise<void> {
  const reply = await client.call('demo.open', {});
  if (!reply.ok) {
    dispatch({ type: 'problem-met', problem: reply.problem });
    return;
  }
  const sent = reply.value;
  const [recording, dark, response, bench] = await Promise.all(
    [sent.recording, sent.dark, sent.response, sent.bench].map(received),
  );
  const parts = [recording, dark, response, bench];
  const damaged = parts.find((part) => part?.file === null && part.name !== null);
  if (damaged !== undefined || !recording?.file) {
    dispatch({ type: 'problem-met', problem: damagedDemo(damaged?.name ?? 'demo recording') });
    return;
  }
  dispatch({
    type: 'demo-opened',
    recording: recording.file,
    slots: {
      ...emptySlots,
      dark: dark?.file ?? null,
      response: response?.file ?? null,
      bench: bench?.file ?? null,
    },
  });
}

async function received(sent: SentFile | null): Promise<{ name: string | null; file: InputFile | null }> {
  return sent === null ? { name: null, file: null } : { name: sent.name, file: await fromSent(sent) };
}

const damagedDemo = (name: string): Problem => ({
  code: 'file.unreadable',
  fileName: name,
  lineNumber: null,
  subject: 'demo',
  expected: 'the file as it was shipped',
  found: 'bytes that were damaged on the way',
  remedy: 'Open the demo again; if it happens again, reinstall the program.',
});
