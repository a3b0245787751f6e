import type { Axis, Figure } from '../../src/core/figures/figure';
import { epochShift } from '../words/instants';
import type { Range, View } from './ranges';

export type LinkGroup = NonNullable<Axis['link']>;
export const LINK_GROUPS: readonly LinkGroup[] = ['time', 'frequency'];

/** What of the views is worth keeping when the page is thrown away. */
export interface SavedViews {
  readonly views: Readonly<Record<string, View>>;
  readonly unlinked: readonly LinkGroup[];
}

/** Which part of which figure is on show. Figures whose x axes are in one link group move together, unless unlinked. */
export class Views {
  readonly #views = new Map<string, View>();
  readonly #figures = new Map<string, Figure>();
  readonly #unlinked = new Set<LinkGroup>();
  readonly #listeners = new Set<() => void>();

  constructor(saved?: SavedViews) {
    for (const [key, view] of Object.entries(saved?.views ?? {})) this.#views.set(key, view);
    for (const group of saved?.unlinked ?? []) this.#unlinked.add(group);
  }

  save(): SavedViews {
    return { views: Object.fromEntries(this.#views), unlinked: [...this.#unlinked] };
  }

  of(key: string): View {
    return this.#views.get(key) ?? {};
  }

  /** Makes a figure known, so that linked ones can move it; gives the way back. */
  register(key: string, figure: Figure): () => void {
    const before = this.#figures.get(key);
    this.#figures.set(key, figure);
    if (before?.x.link !== figure.x.link) this.#tell();
    return () => {
      if (this.#figures.get(key) === figure) this.#figures.delete(key);
    };
  }

  set(key: string, view: View): void {
    this.#put(key, view);
    const figure = this.#figures.get(key);
    const group = figure?.x.link;
    if (figure && group && !this.#unlinked.has(group)) {
      for (const [other, target] of this.#figures) {
        if (other === key || target.x.link !== group) continue;
        const { y } = this.of(other);
        const x = view.x && carried(view.x, figure.x, target.x);
        if (view.x && !x) continue;
        this.#put(other, { ...(x ? { x } : {}), ...(y ? { y } : {}) });
      }
    }
    this.#tell();
  }

  isLinked(group: LinkGroup): boolean {
    return !this.#unlinked.has(group);
  }

  setLinked(group: LinkGroup, linked: boolean): void {
    if (linked) this.#unlinked.delete(group);
    else this.#unlinked.add(group);
    this.#tell();
  }

  /** Number of figures on the page in a link group. */
  count(group: LinkGroup): number {
    return [...this.#figures.values()].filter((f) => f.x.link === group).length;
  }

  onChange(listener: () => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  #put(key: string, view: View): void {
    if (view.x || view.y) this.#views.set(key, view);
    else this.#views.delete(key);
  }

  #tell(): void {
    for (const l of this.#listeners) l();
  }
}

/** A range of one axis on another; times are carried over between epochs. Undefined when the other shows none of it. */
export function carried(range: Range, from: Axis, to: Axis): Range | undefined {
  const shift = from.epoch !== undefined && to.epoch !== undefined ? epochShift(from.epoch, to.epoch) : 0;
  const out: Range = [range[0] + shift, range[1] + shift];
  return out[1] > to.extent[0] && out[0] < to.extent[1] ? out : undefined;
}
