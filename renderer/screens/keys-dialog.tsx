import { useEffect, useRef } from 'react';

const keys: readonly (readonly [string, string])[] = [
  ['Ctrl O', 'add files: recordings, dark, response, bench, saved diagnosis'],
  ['Ctrl S', 'save the diagnosis, with every file it came from'],
  ['Ctrl Z', 'undo'],
  ['Ctrl Shift Z', 'redo'],
  ['?', 'this list'],
];

const chartKeys: readonly (readonly [string, string])[] = [
  ['← →', 'move along the axis when zoomed in'],
  ['Shift ← →', 'move the cursor by one pixel'],
  ['Page Up, Page Down', 'move the cursor to the next line found'],
  ['+ −', 'zoom in and out at the cursor'],
  ['0', 'the whole recording'],
  ['L', 'linear or logarithmic'],
];

export function KeysDialog({ onClose }: { readonly onClose: () => void }) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => dialog.current?.showModal(), []);
  return (
    <dialog ref={dialog} className="keys-dialog" aria-labelledby="keys-title" onClose={onClose}>
      <h2 id="keys-title">Keys</h2>
      <KeyTable caption="Anywhere" rows={keys} />
      <KeyTable caption="On the recording (after Tab or a click on it)" rows={chartKeys} />
      <p>
        On the recording a drag zooms, a double click shows the whole, and the wheel zooms once it was
        clicked.
      </p>
      <button type="button" onClick={() => dialog.current?.close()}>
        Close
      </button>
    </dialog>
  );
}

function KeyTable({ caption, rows }: { readonly caption: string; readonly rows: typeof keys }) {
  return (
    <table>
      <caption>{caption}</caption>
      <tbody>
        {rows.map(([key, meaning]) => (
          <tr key={key}>
            <th scope="row">
              <kbd>{key}</kbd>
            </th>
            <td>{meaning}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
