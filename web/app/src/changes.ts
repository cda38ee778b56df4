import { type Edit, Refused, server, taken } from './api';
import { answered, refused, waitFor } from './asked';
import { joined } from './joined';
import { newest } from './latest';
import { changed, type State } from './state';
import type { Store } from './store';
import { words } from './words';

/** What people do to the plan: try, drag, undo, save. Nothing is written to the file but by save. */
export interface Changes {
  /** Reads the plan in the file and begins anew from it. */
  read(): Promise<void>;
  attempt(edits: Edit[], what: string): Promise<void>;
  /** Tries what is being dragged, as often as the server keeps up; all links, or the one that is looked at. */
  drag(edits: Edit[], allLinks: boolean): void;
  /** Ends a drag without keeping it. */
  letGo(): void;
  undo(): Promise<void>;
  redo(): Promise<void>;
  save(): Promise<void>;
  /** Looks whether the file has been changed by others. */
  look(): Promise<void>;
}

export function createChanges(store: Store<State>): Changes {
  const caught = (error: unknown) => store.set({ trouble: refused(error) });
  const now = () => store.get();
  const kept = () => now().steps[now().at]!;

  async function read() {
    store.set({ plan: waitFor(now().plan) });
    try {
      const plan = await taken(server.GET('/api/plan'));
      store.set({
        plan: answered(plan),
        version: plan.version,
        saved: plan.version,
        steps: [{ version: plan.version, text: plan.text, what: '' }],
        at: 0,
        trouble: undefined,
      });
    } catch (error) {
      store.set({ plan: refused(error) });
    }
  }

  async function attempt(edits: Edit[], what: string) {
    if (edits.length === 0) return letGo();
    store.set({ links: waitFor(now().links) });
    try {
      const tried = await taken(server.POST('/api/try', { body: { version: kept().version, edits } }));
      if (tried.version === kept().version) return letGo();
      const plan = await taken(server.GET('/api/plan', { params: { query: { version: tried.version } } }));
      const { steps, at } = now();
      store.set({
        version: tried.version,
        plan: answered(plan),
        links: answered(tried.links),
        steps: [...steps.slice(0, at + 1), { version: tried.version, text: plan.text, what }],
        at: at + 1,
        dragging: false,
        trouble: undefined,
        said: what,
      });
    } catch (error) {
      caught(error);
      letGo();
    }
  }

  const dragTo = newest(async ({ edits, allLinks }: { edits: Edit[]; allLinks: boolean }) => {
    const base = kept().version;
    const link = allLinks ? undefined : now().link;
    try {
      const tried = await taken(server.POST('/api/try', { body: { version: base, edits, ...(link ? { link } : {}) } }));
      if (!now().dragging || kept().version !== base) return;
      store.set({
        version: tried.version,
        links: answered(joined(now().links.value, tried.links)),
        trouble: undefined,
      });
    } catch (error) {
      if (now().dragging) caught(error);
    }
  });

  function letGo() {
    const { links } = now();
    if (now().version !== kept().version) store.set({ dragging: false, version: kept().version });
    else store.set({ dragging: false, ...(links.value ? { links: answered(links.value) } : {}) });
  }

  // A version that the server has put away meanwhile comes back by its text.
  async function go(at: number, what: string) {
    const step = now().steps[at];
    if (!step) return;
    try {
      await taken(server.POST('/api/plan/check', { body: { text: step.text } }));
      store.set({ at, version: step.version, trouble: undefined, said: what });
    } catch (error) {
      caught(error);
    }
  }

  async function save() {
    if (!changed(now())) return;
    store.set({ saving: true });
    try {
      const { version } = await taken(server.PUT('/api/plan', { body: { read: now().saved, text: kept().text } }));
      const plan = now().plan.value;
      store.set({ saved: version, trouble: undefined, said: words.savedAs(plan?.file ?? '') });
    } catch (error) {
      caught(error);
    }
    store.set({ saving: false });
  }

  async function look() {
    const before = now().saved;
    try {
      const plan = await taken(server.GET('/api/plan'));
      if (now().saving || now().saved !== before) return;
      const shown = now().plan.value;
      if (shown && shown.file_problems.length + plan.file_problems.length > 0) {
        store.set({ plan: answered({ ...shown, file_problems: plan.file_problems }) });
      }
      if (plan.file_problems.length > 0 || plan.version === before) return;
      if (changed(now())) store.set({ trouble: refused(new Refused(conflict)) });
      else await read();
    } catch {
      // The next call that someone waits for says that the server is gone.
    }
  }

  return {
    read,
    attempt,
    drag(edits, allLinks) {
      store.set({ dragging: true });
      dragTo({ edits, allLinks });
    },
    letGo,
    undo: () => go(now().at - 1, words.undoWhat(now().steps[now().at]?.what ?? '')),
    redo: () => go(now().at + 1, words.redoWhat(now().steps[now().at + 1]?.what ?? '')),
    save,
    look,
  };
}

const conflict = { title: '', status: 409, detail: words.conflict };
