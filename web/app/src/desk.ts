import { server, taken } from './api';
import { type Asked, answered, refused, waitFor } from './asked';
import { rangeAround, weighed } from './heights';
import { latest } from './latest';
import { chosenLink, linkId, type State, stationOf } from './state';
import type { Store } from './store';

/** The parts of the state that hold an answer of the server. */
type Part = 'plan' | 'links' | 'section' | 'antenna' | 'heights';
type Answer<P extends Part> = NonNullable<State[P]['value']>;

/**
 * desk keeps what the page shows of the server's answers in step with what is chosen: one watcher asks for what a change
 * of the version, the link, the end or the mast has made stale.
 */
export function desk(store: Store<State>): void {
  function asking<P extends Part, A extends unknown[]>(
    part: P,
    call: (signal: AbortSignal, ...args: A) => Promise<Answer<P>>,
  ): (...args: A) => void {
    const put = (asked: Asked<Answer<P>>) => store.set({ [part]: asked } as Pick<State, P>);
    const ask = latest(
      (signal, ...args: A) => call(signal, ...args).then(answered, refused<Answer<P>>),
      (asked: Asked<Answer<P>>) => put(asked),
    );
    return (...args) => {
      put(waitFor(store.get()[part] as Asked<Answer<P>>));
      ask(...args);
    };
  }

  const plan = asking('plan', (signal, version: string) =>
    taken(server.GET('/api/plan', { params: { query: { version } }, signal })),
  );
  const links = asking('links', (signal, version: string) =>
    taken(server.GET('/api/links', { params: { query: { version } }, signal })),
  );
  const section = asking('section', (signal, version: string, link: string) =>
    taken(server.GET('/api/section', { params: { query: { version, link } }, signal })),
  );
  const antenna = asking('antenna', (signal, version: string, station: string, mast: boolean) =>
    taken(server.GET('/api/antenna', { params: { query: { version, station, mast, curve: true } }, signal })),
  );
  const heights = asking('heights', (signal, version: string, station: string, aboveM: number, antennas: string[]) =>
    weighed(antennas, (antenna) => {
      const { fromM, toM, stepM } = rangeAround(aboveM);
      const query = { version, station, from_m: fromM, to_m: toM, step_m: stepM, antennas: [antenna] };
      return taken(server.GET('/api/heights', { params: { query }, signal }));
    }),
  );

  store.watch((now, before) => {
    const version = now.version;
    const moved = version !== before.version;
    if (version === '') return;
    if (moved && !now.dragging && now.plan.value?.version !== version) plan(version);
    if (moved && now.links === before.links) links(version);
    const list = now.plan.value?.links;
    if (list && !list.some((l) => linkId(l) === now.link)) {
      const first = list[0];
      if (first) store.set({ link: linkId(first) });
      return;
    }
    if (now.link !== undefined && (moved || now.link !== before.link)) section(version, now.link);
    if (now.dragging) return;
    const end = chosenLink(now)?.[now.end];
    const found = end === undefined ? undefined : stationOf(now.plan.value, end);
    if (!found || end === undefined || now.plan.value?.version !== version) return;
    const seen = shown(now) !== shown(before);
    if (seen || now.withMast !== before.withMast) antenna(version, end, now.withMast);
    if (seen)
      heights(
        version,
        end,
        found.station.above_ground_m,
        now.plan.value.antennas.map((a) => a.name),
      );
  });
}

/** shown names what the antenna panel and the height table are of, once it is all there. */
function shown(s: State): string {
  const end = chosenLink(s)?.[s.end];
  return end !== undefined && !s.dragging && s.plan.value?.version === s.version ? `${s.version} ${end}` : '';
}
