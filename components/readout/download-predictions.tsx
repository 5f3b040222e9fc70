'use client';
import { useState } from 'react';
import { saveBlob } from '@/components/charts/save-blob';
import { Button } from '@/components/ui/button';
import { readApiError } from '@/lib/client/read-api-error';

const forms = [
  { word: 'CSV', type: 'text/csv', extension: 'csv' },
  { word: 'Arrow', type: 'application/vnd.apache.arrow.stream', extension: 'arrow' },
] as const;

/** The held-out predictions as files: every window, repeat, fold and trial. */
export function DownloadPredictions({ readoutId, fileName }: { readoutId: string; fileName: string }) {
  const [error, setError] = useState<string | null>(null);
  const [busy, setBusy] = useState<string | null>(null);
  const save = async (form: (typeof forms)[number]): Promise<void> => {
    setBusy(form.word);
    setError(null);
    try {
      const response = await fetch(`/api/v1/readouts/${readoutId}/predictions`, {
        headers: { accept: form.type },
        credentials: 'same-origin',
      });
      if (!response.ok) throw await readApiError(response);
      saveBlob(await response.blob(), `${fileName}-predictions.${form.extension}`);
    } catch (cause) {
      setError(cause instanceof Error ? cause.message : 'The predictions could not be read. Try again.');
    }
    setBusy(null);
  };
  return (
    <>
      Predictions:{' '}
      {forms.map((form, index) => (
        <span key={form.word}>
          {index > 0 && ' · '}
          <Button kind="link" onClick={() => void save(form)}>
            {busy === form.word ? `reading ${form.word}` : form.word}
          </Button>
        </span>
      ))}
      {error && (
        <span className="err" role="alert">
          {' '}
          {error}
        </span>
      )}
    </>
  );
}
