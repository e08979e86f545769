import { useEffect, useState } from 'react';

/** Files can be dropped anywhere in the window; it says so while they hover. */
export function DropTarget({ onFiles }: { readonly onFiles: (files: readonly File[]) => void }) {
  const [isHovering, setIsHovering] = useState(false);

  useEffect(() => {
    const hasFiles = (event: DragEvent): boolean => event.dataTransfer?.types.includes('Files') === true;
    const over = (event: DragEvent): void => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      setIsHovering(true);
    };
    const leave = (event: DragEvent): void => {
      if (event.relatedTarget === null) setIsHovering(false);
    };
    const drop = (event: DragEvent): void => {
      if (!hasFiles(event)) return;
      // Without this the window would leave the page and show the file.
      event.preventDefault();
      setIsHovering(false);
      onFiles([...(event.dataTransfer?.files ?? [])]);
    };
    addEventListener('dragover', over);
    addEventListener('dragleave', leave);
    addEventListener('drop', drop);
    return () => {
      removeEventListener('dragover', over);
      removeEventListener('dragleave', leave);
      removeEventListener('drop', drop);
    };
  }, [onFiles]);

  if (!isHovering) return null;
  return (
    <div className="drop-veil" role="status">
      Drop recordings, dark, response, bench file or a saved diagnosis
    </div>
  );
}
