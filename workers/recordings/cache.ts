/** Decoded recordings kept in a worker's memory: the least recently used go first when there are too many bytes. */
import type { Store } from '../store/types';
import { readDecodedNote } from './files';
import { loadRecording, notDecoded, type LoadedRecording } from './load';

export class RecordingCache {
  /** In order of use, the newest last. */
  private readonly held = new Map<string, LoadedRecording>();

  constructor(
    private readonly store: Store,
    private readonly maxBytes: number,
  ) {}

  /** A recording that was decoded anew since is loaded again. Throws JobFailed where it is not decoded. */
  async load(recordingId: string): Promise<LoadedRecording> {
    const held = this.held.get(recordingId);
    this.held.delete(recordingId);
    if (held) {
      const note = await readDecodedNote(this.store, recordingId);
      if (!note) throw notDecoded();
      if (note.sha256 === held.sha256) return this.keep(recordingId, held);
    }
    return this.keep(recordingId, await loadRecording(this.store, recordingId));
  }

  private keep(recordingId: string, loaded: LoadedRecording): LoadedRecording {
    this.held.set(recordingId, loaded);
    let bytes = [...this.held.values()].reduce((sum, one) => sum + one.bytes, 0);
    for (const [id, one] of this.held) {
      if (bytes <= this.maxBytes || this.held.size === 1) break;
      this.held.delete(id);
      bytes -= one.bytes;
    }
    return loaded;
  }
}
