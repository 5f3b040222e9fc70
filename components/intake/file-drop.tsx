'use client';

import { useDropzone } from 'react-dropzone';
import type { ReactNode } from 'react';
import { Button } from '@/components/ui/button';

/** The whole page as a place to drop files on, with the words and the picker where they belong. `children` is the page. */
export function FileDrop({
  onFiles,
  isOff,
  children,
}: {
  onFiles: (files: readonly File[]) => void;
  isOff: boolean;
  children: (parts: { zone: ReactNode }) => ReactNode;
}) {
  const { getRootProps, getInputProps, isDragActive, open } = useDropzone({
    onDrop: (accepted) => onFiles(accepted),
    noClick: true,
    noKeyboard: true,
    disabled: isOff,
  });
  const zone = isOff ? null : (
    <>
      <input {...getInputProps({ 'aria-label': 'Files to add' })} />
      <div className={isDragActive ? 'drop over' : 'drop'}>
        <Button kind="plain" onClick={open}>
          Add files
        </Button>
        <span>or drop them anywhere on this page. NPY, NPZ, CSV or TSV; recognised by content.</span>
      </div>
    </>
  );
  return (
    <div {...getRootProps({ role: undefined, tabIndex: undefined, className: 'sheet-drop' })}>
      {children({ zone })}
    </div>
  );
}
