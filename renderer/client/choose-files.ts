/** Opens the system's own dialog for files; nothing happens when it is closed without a choice. */
export function chooseFiles(isMultiple: boolean, onFiles: (files: readonly File[]) => void): void {
  const input = document.createElement('input');
  input.type = 'file';
  input.multiple = isMultiple;
  input.addEventListener('change', () => onFiles([...(input.files ?? [])]));
  input.click();
}
