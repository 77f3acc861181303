/** Who else has a bench open over a recording, and the newest run of each. */
import { useEffect, useState } from 'react';
import type { BenchCompany, BenchRun, BenchVisitor } from '@/shared/contracts/live';
import { takeLiveSocket } from './live/live-socket';

/** Opens the bench for others to see, and tells of theirs; `benchId` is this one's. */
export function useBenchCompany(recordingId: string, benchId: string): BenchVisitor[] {
  const [visitors, setVisitors] = useState<BenchVisitor[]>([]);
  const [runs, setRuns] = useState<Readonly<Record<string, string>>>({});
  useEffect(() => {
    const { socket, release } = takeLiveSocket();
    const open = () => void socket.emit('bench:open', { recordingId, benchId }, () => undefined);
    const onCompany = (message: BenchCompany) =>
      message.recordingId === recordingId && setVisitors(message.visitors);
    const onRun = (message: BenchRun) =>
      message.recordingId === recordingId &&
      message.benchId !== benchId &&
      setRuns((old) => ({ ...old, [message.benchId]: message.runId }));
    socket.on('connect', open);
    socket.on('bench:company', onCompany);
    socket.on('bench:run', onRun);
    if (socket.connected) open();
    return () => {
      socket.off('connect', open);
      socket.off('bench:company', onCompany);
      socket.off('bench:run', onRun);
      socket.emit('bench:close');
      release();
    };
  }, [recordingId, benchId]);
  return visitors
    .filter((visitor) => visitor.benchId !== benchId)
    .map((visitor) => ({ ...visitor, runId: runs[visitor.benchId] ?? visitor.runId }));
}
