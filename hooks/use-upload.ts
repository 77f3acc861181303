import { useCallback, useEffect, useRef, useState } from 'react';
import type { Recording } from '@/shared/contracts/recordings';
import type { Upload } from './api';
import { filesOf, uploadRecording, useKeepRecording, type UploadInput } from './recordings';

export type UploadState =
  | { phase: 'idle' }
  | { phase: 'sending'; sent: number; total: number; perSecond: number | null }
  | { phase: 'failed'; error: unknown }
  | { phase: 'cancelled' };

/** One upload at a time; leaving the page while it runs is asked about by the browser, leaving the screen cancels it. */
export function useUpload(onDone: (recording: Recording) => void) {
  const [state, setState] = useState<UploadState>({ phase: 'idle' });
  const running = useRef<Upload<Recording> | null>(null);
  const keep = useKeepRecording();

  const start = useCallback(
    async (input: UploadInput) => {
      const began = performance.now();
      setState({ phase: 'sending', sent: 0, total: sizeOf(input), perSecond: null });
      const upload = uploadRecording(input, (sent, total) => {
        const seconds = (performance.now() - began) / 1000;
        setState({ phase: 'sending', sent, total, perSecond: seconds > 0.5 ? sent / seconds : null });
      });
      running.current = upload;
      try {
        const recording = await upload.done;
        await keep(recording);
        setState({ phase: 'idle' });
        onDone(recording);
      } catch (error) {
        const cancelled = error instanceof DOMException && error.name === 'AbortError';
        setState(cancelled ? { phase: 'cancelled' } : { phase: 'failed', error });
      } finally {
        running.current = null;
      }
    },
    [keep, onDone],
  );

  useEffect(() => () => running.current?.cancel(), []);
  const sending = state.phase === 'sending';
  useEffect(() => {
    if (!sending || typeof window === 'undefined') return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [sending]);

  return { state, start, cancel: () => running.current?.cancel() };
}

const sizeOf = (input: UploadInput) => filesOf(input).reduce((sum, [, file]) => sum + file.size, 0);
