import type { Readable } from 'node:stream';

export interface StoredObject {
  key: string;
  size: number;
}

/** Files by key. Keys are opaque ids under a folder-like prefix, never names people gave. */
export interface ObjectStore {
  /**
   * Stores a stream whole or not at all.
   * @param size bytes, when known beforehand; else the stream is gathered in parts
   */
  put(
    key: string,
    body: Readable | Buffer,
    options?: { size?: number; type?: string },
  ): Promise<void>;
  /** @throws ObjectMissing */
  get(key: string): Promise<Readable>;
  /** Deletes; a key that is not there is no error, so that a repeated clean-up succeeds. */
  delete(key: string): Promise<void>;
  /** All objects below a prefix, in order of key. */
  list(prefix: string): Promise<StoredObject[]>;
  /** @throws when the storage can't be reached; for readiness. */
  check(): Promise<void>;
  close(): void;
}

export class ObjectMissing extends Error {
  readonly key: string;

  constructor(key: string) {
    super(`no object ${key}`);
    this.name = 'ObjectMissing';
    this.key = key;
  }
}
