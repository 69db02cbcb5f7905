'use client';

import { wrap, type Remote } from 'comlink';
import { useEffect, useRef, useState } from 'react';
import type { Preview, PreviewRequest } from './preview';
import type { PreviewWorker } from './preview.worker';

interface Desk {
  worker: Worker;
  remote: Remote<PreviewWorker>;
  busy: boolean;
  /** The newest request that came while the worker was busy; older ones are dropped. */
  next: PreviewRequest | null;
}

/** The preview of the newest request. While one is being worked out the last answer stays on the page. */
export function usePreview(request: PreviewRequest | null): {
  preview: Preview | null;
  failure: string | null;
} {
  const [preview, setPreview] = useState<Preview | null>(null);
  const [failure, setFailure] = useState<string | null>(null);
  const desk = useRef<Desk | null>(null);

  useEffect(() => {
    const worker = new Worker(new URL('./preview.worker.ts', import.meta.url), { type: 'module' });
    desk.current = { worker, remote: wrap<PreviewWorker>(worker), busy: false, next: null };
    return () => {
      worker.terminate();
      desk.current = null;
    };
  }, []);

  useEffect(() => {
    const here = desk.current;
    if (!here || !request) return;
    here.next = request;
    if (here.busy) return;
    void (async () => {
      here.busy = true;
      while (here.next && desk.current === here) {
        const current = here.next;
        here.next = null;
        try {
          const answer = await here.remote.preview(current);
          if (desk.current === here) {
            setPreview(answer);
            setFailure(null);
          }
        } catch (error) {
          setFailure(error instanceof Error ? error.message : String(error));
        }
      }
      here.busy = false;
    })();
  }, [request]);

  return { preview, failure };
}
