import { Injectable } from '@angular/core';
import { clear, createStore, del, get, set, type UseStore } from 'idb-keyval';

/**
 * What this phone keeps: the last instructions, so that they can be read with no signal, and answers that the clinic
 * does not have yet. A browser that refuses storage (private windows) keeps it for as long as the page is open.
 */
@Injectable({ providedIn: 'root' })
export class FamilyPhone {
  private readonly memory = new Map<string, unknown>();
  private store: UseStore | null = null;

  async read<T>(key: string): Promise<T | null> {
    try {
      return ((await get(key, this.kept())) as T | undefined) ?? this.remembered(key);
    } catch {
      return this.remembered(key);
    }
  }

  async keep(key: string, value: unknown): Promise<void> {
    this.memory.set(key, value);
    try {
      await set(key, value, this.kept());
    } catch {
      // The memory above is all there is.
    }
  }

  async remove(key: string): Promise<void> {
    this.memory.delete(key);
    try {
      await del(key, this.kept());
    } catch {
      // Nothing was kept.
    }
  }

  async forgetEverything(): Promise<void> {
    this.memory.clear();
    try {
      await clear(this.kept());
    } catch {
      // Nothing was kept.
    }
  }

  private remembered<T>(key: string): T | null {
    return (this.memory.get(key) as T | undefined) ?? null;
  }

  private kept(): UseStore {
    this.store ??= createStore('threedawn-family', 'kept');
    return this.store;
  }
}
