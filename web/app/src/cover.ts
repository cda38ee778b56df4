import { type CoverJob, server, taken } from './api';
import { refused } from './asked';
import { listen } from './listen';
import type { State } from './state';
import type { Store } from './store';
import { words } from './words';

/** What of a coverage map is drawn: its margin in shades, its bands in hatches, or nothing. */
export type CoverShown = 'margin' | 'bands' | 'none';

/** A Cover is a coverage job, and what of it is shown. */
export interface Cover {
  job: CoverJob;
  shown: CoverShown;
  bands?: unknown; // GeoJSON
}

export interface CoverDesk {
  start(site: string): Promise<void>;
  cancel(): Promise<void>;
  show(shown: CoverShown): Promise<void>;
}

/** createCover runs one coverage job at a time and watches it to its end. */
export function createCover(store: Store<State>): CoverDesk {
  let stop = () => {};
  const caught = (error: unknown) => store.set({ trouble: refused(error) });
  const put = (job: CoverJob) => {
    const before = store.get().cover;
    store.set({
      cover: { job, shown: before?.shown ?? 'margin' },
      ...(job.state === 'running' ? {} : { said: words.coverState[job.state] }),
    });
  };

  async function look(id: string) {
    try {
      put(await taken(server.GET('/api/coverage/{id}', { params: { path: { id } } })));
    } catch (error) {
      caught(error);
    }
  }

  return {
    async start(site) {
      stop();
      const { version } = store.get();
      try {
        const job = await taken(server.POST('/api/coverage', { body: { site, ...(version ? { version } : {}) } }));
        store.set({ cover: { job, shown: 'margin' }, trouble: undefined });
        stop = listen(
          '/api/coverage/{id}/events',
          `./api/coverage/${job.id}/events`,
          {
            progress: ({ done, total }) => {
              const now = store.get().cover;
              if (now?.job.id === job.id) store.set({ cover: { ...now, job: { ...now.job, done, total } } });
            },
            finished: put,
          },
          'finished',
          () => void look(job.id),
        );
      } catch (error) {
        caught(error);
      }
    },
    async cancel() {
      const id = store.get().cover?.job.id;
      if (id === undefined) return;
      stop();
      try {
        put(await taken(server.DELETE('/api/coverage/{id}', { params: { path: { id } } })));
      } catch (error) {
        caught(error);
        await look(id);
      }
    },
    async show(shown) {
      const cover = store.get().cover;
      if (!cover) return;
      store.set({ cover: { ...cover, shown } });
      if (shown !== 'bands' || cover.bands) return;
      try {
        const path = { id: cover.job.id };
        const bands = await taken<unknown>(
          server.GET('/api/coverage/{id}/bands', { params: { path }, parseAs: 'json' }),
        );
        const now = store.get().cover;
        if (now?.job.id === cover.job.id) store.set({ cover: { ...now, bands } });
      } catch (error) {
        caught(error);
      }
    },
  };
}
