/** Puts text on the clipboard; false when the system does not allow it. */
export async function copyText(text: string): Promise<boolean> {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    return copyThroughSelection(text);
  }
}

/** The old way, for hosts that grant no clipboard permission to a page. */
function copyThroughSelection(text: string): boolean {
  const field = document.createElement('textarea');
  field.value = text;
  field.className = 'out-of-sight';
  document.body.append(field);
  const before = document.activeElement;
  field.select();
  const isCopied = document.execCommand('copy');
  field.remove();
  if (before instanceof HTMLElement) before.focus();
  return isCopied;
}
