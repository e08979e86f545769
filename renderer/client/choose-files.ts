/** Opens the system's own dialog for files; nothing happens when it is closed without a choice. */
export function chooseFiles(isMultiple: boolean, onFiles: (files: readonly File[]) => void): void {
  const input = document.createElement('input');
  input.type = 'file';
  input.multiple = isMultiple;
  input.hidden = true;
  input.addEventListener('change', () => {
    onFiles([...(input.files ?? [])]);
    input.remove();
  });
  input.addEventListener('cancel', () => input.remove());
  // In the page while the dialog is open: an element that nothing holds may be collected before it answers.
  document.body.append(input);
  input.click();
}
