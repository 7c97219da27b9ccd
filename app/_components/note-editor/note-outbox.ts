import { ApiError } from '../api-client';
import type { KeyValueStore } from './key-value-store';
import type { NoteDocument, NotePin } from './note-draft';

/** A note on its way. It stays on this device until the server has answered for it. */
export interface OutgoingNote {
  clientKey: string;
  personId: string;
  workspaceId: string;
  revisionId: string;
  /** The thread that is answered; null opens a new one. */
  threadId: string | null;
  findingId: string | null;
  pin: NotePin | null;
  mustSettle: boolean;
  body: NoteDocument;
  /** Where the draft goes back to when the note is refused. */
  draftKey: string;
  writtenAt: number;
}

export type OutgoingState = 'sending' | 'waiting' | 'signed-out';
export type OutgoingEntry = OutgoingNote & { state: OutgoingState };

export interface OutboxParts {
  store: KeyValueStore;
  send: (note: OutgoingNote) => Promise<void>;
  onSent: (note: OutgoingNote) => void | Promise<void>;
  /** The server will never take it as it is: the text goes back to its writer with the reason. */
  onRefused: (note: OutgoingNote, error: ApiError) => void | Promise<void>;
}

/** Worth sending again as it is: nothing answered, the server is unwell or busy, or still works on it. */
export function isPassing(error: unknown): boolean {
  if (!(error instanceof ApiError)) return true;
  return (
    error.status === 0 || error.status === 429 || error.status >= 500 || error.reason === 'still-running'
  );
}

/** Sends notes in the order they were written, each once: the server knows a repeated `clientKey`. */
export class NoteOutbox {
  private entries: readonly OutgoingEntry[] = [];
  private readonly listeners = new Set<() => void>();
  private running: Promise<void> | null = null;
  private again = false;

  constructor(
    private readonly parts: OutboxParts,
    private readonly personId: string,
  ) {}

  snapshot = (): readonly OutgoingEntry[] => this.entries;

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => {
      this.listeners.delete(listener);
    };
  };

  /** Takes up what an earlier visit left; notes of somebody else who used this browser stay untouched. */
  async open(): Promise<void> {
    const kept = await this.parts.store.entries<OutgoingNote>();
    const known = new Set(this.entries.map((entry) => entry.clientKey));
    const mine = kept
      .map(([, note]) => note)
      .filter((note) => note.personId === this.personId && !known.has(note.clientKey))
      .map((note) => ({ ...note, state: 'waiting' as const }));
    this.set([...mine, ...this.entries].sort((a, b) => a.writtenAt - b.writtenAt));
    await this.flush();
  }

  async add(note: OutgoingNote): Promise<void> {
    await this.parts.store.set(note.clientKey, note);
    this.set([...this.entries.filter((e) => e.clientKey !== note.clientKey), { ...note, state: 'sending' }]);
    await this.flush();
  }

  /** Sends what waits; who asks while that runs shares the run, and one more follows for late comers. */
  flush(): Promise<void> {
    this.again = true;
    this.running ??= this.run().finally(() => {
      this.running = null;
      return this.again ? this.flush() : undefined;
    });
    return this.running;
  }

  private async run(): Promise<void> {
    this.again = false;
    let next: OutgoingEntry | undefined;
    const tried = new Set<string>();
    while ((next = this.entries.find((entry) => !tried.has(entry.clientKey)))) {
      tried.add(next.clientKey);
      this.mark(next.clientKey, 'sending');
      try {
        await this.parts.send(next);
        await this.parts.onSent(next);
      } catch (error) {
        if (error instanceof ApiError && error.status === 401) {
          this.markAll('signed-out');
          return;
        }
        if (isPassing(error)) {
          this.markAll('waiting');
          return;
        }
        await this.parts.onRefused(next, error as ApiError);
      }
      await this.parts.store.delete(next.clientKey);
      this.set(this.entries.filter((entry) => entry.clientKey !== next?.clientKey));
    }
  }

  private mark(clientKey: string, state: OutgoingState): void {
    this.set(this.entries.map((entry) => (entry.clientKey === clientKey ? { ...entry, state } : entry)));
  }

  private markAll(state: OutgoingState): void {
    this.set(this.entries.map((entry) => ({ ...entry, state })));
  }

  private set(entries: readonly OutgoingEntry[]): void {
    this.entries = entries;
    this.listeners.forEach((listener) => listener());
  }
}
