import { openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { LocalTake } from '../model/take';

interface TakesSchema extends DBSchema {
  takes: { key: string; value: LocalTake };
}

const NAME = 'benchlark-takes';
const VERSION = 1;

/** Takes in this browser's own keeping: what was measured outlives a closed tab, a lost line, an ended session. */
export class TakeStore {
  readonly #database: Promise<IDBPDatabase<TakesSchema>>;

  constructor() {
    this.#database = openDB<TakesSchema>(NAME, VERSION, {
      upgrade: (database) => {
        database.createObjectStore('takes', { keyPath: 'id' });
      },
    });
  }

  /** Newest first. */
  async all(): Promise<LocalTake[]> {
    const takes = await (await this.#database).getAll('takes');
    return takes.sort((a, b) => b.madeAt.localeCompare(a.madeAt));
  }

  async put(take: LocalTake): Promise<void> {
    await (await this.#database).put('takes', take);
  }

  async remove(id: string): Promise<void> {
    await (await this.#database).delete('takes', id);
  }
}
