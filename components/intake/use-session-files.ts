'use client';

import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';
import { requestJson } from '@/lib/client/request-json';
import { useLiveEvents } from '@/lib/client/use-live-events';
import { pageOf } from '@/lib/contracts/common';
import { fileSchema, type StoredFile } from '@/lib/contracts/file';
import { sessionSchema, type Session } from '@/lib/contracts/session';

/** A session and its files, kept up to date by its live events. Files come in the order in which they were added. */
export function useSessionFiles(initial: { session: Session; files: StoredFile[] }): {
  session: Session;
  files: StoredFile[];
  refresh: () => void;
} {
  const { id } = initial.session;
  const client = useQueryClient();
  const session = useQuery({
    queryKey: ['session', id],
    queryFn: ({ signal }) => requestJson(`/sessions/${id}`, { schema: sessionSchema, signal }),
    initialData: initial.session,
  });
  const files = useQuery({
    queryKey: ['files', id],
    queryFn: async ({ signal }) => {
      const page = await requestJson(`/sessions/${id}/files?limit=200`, {
        schema: pageOf(fileSchema),
        signal,
      });
      return page.items.reverse();
    },
    initialData: initial.files,
  });
  const refresh = useCallback(() => {
    void client.invalidateQueries({ queryKey: ['session', id] });
    void client.invalidateQueries({ queryKey: ['files', id] });
  }, [client, id]);
  useLiveEvents(id, {
    onEvent: (event) => {
      if (event.kind !== 'readout') refresh();
    },
    onPoll: refresh,
  });
  return { session: session.data, files: files.data, refresh };
}
