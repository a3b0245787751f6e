import type { Figure } from '../../src/core/figures/figure';
import type { CardHead, CardView, LookState, ToLookPage } from '../../src/core/protocol/panel';

/** What the page shows: the editor's state, and figures redrawn for a zoomed view on top of the cards' own. */
export interface PageState {
  readonly look: LookState;
  /** By card and figure id; dropped when the card gets a new result. */
  readonly redrawn: ReadonlyMap<string, Figure>;
}

export const figureKey = (card: string, figure: string): string => `${card}/${figure}`;

/** Which redraws are awaited: a figure's last request, so that a late answer to an earlier one is dropped. */
export class Requests {
  #next = 1;
  readonly #open = new Map<number, string>();
  readonly #last = new Map<string, number>();

  start(key: string): number {
    const request = this.#next++;
    this.#open.set(request, key);
    this.#last.set(key, request);
    return request;
  }

  /** Figure the answer is for, or undefined when a later request has overtaken it. */
  finish(request: number): string | undefined {
    const key = this.#open.get(request);
    this.#open.delete(request);
    return key !== undefined && this.#last.get(key) === request ? key : undefined;
  }
}

/** State after a message; the first must be the whole state. */
export function reduce(
  state: PageState | undefined,
  message: ToLookPage,
  requests: Requests,
): PageState | undefined {
  if (message.type === 'look') return { look: message.state, redrawn: new Map() };
  if (!state) return undefined;
  const { look, redrawn } = state;
  switch (message.type) {
    case 'outline': {
      const { heads, ...rest } = message.outline;
      const before = new Map(look.cards.map((c) => [c.id, c]));
      return { redrawn, look: { ...look, ...rest, cards: heads.map((h) => withHead(before.get(h.id), h)) } };
    }
    case 'card': {
      const { card } = message;
      const cards = look.cards.map((c) => (c.id === card.id ? card : c));
      return { look: { ...look, cards }, redrawn: without(redrawn, card.id) };
    }
    case 'progress': {
      const { id, fraction, note } = message;
      const cards = look.cards.map((c): CardView => {
        if (c.id !== id) return c;
        const next = { ...c, state: 'running' as const, fraction, note };
        return note === undefined ? omit(next, 'note') : { ...next, note };
      });
      return { look: { ...look, cards }, redrawn };
    }
    case 'figures': {
      const key = requests.finish(message.request);
      const figure = message.figures.find((f) => figureKey(message.id, f.id) === key);
      return key === undefined || !figure ? state : { look, redrawn: new Map(redrawn).set(key, figure) };
    }
    case 'figures-failed':
      requests.finish(message.request);
      return state;
    case 'reveal':
      return state;
  }
}

/** A card's head renewed, its last result kept; the same object when nothing changed, so it need not be drawn again. */
function withHead(before: CardView | undefined, head: CardHead): CardView {
  const next: CardView = before?.card && before.do === head.do ? { ...head, card: before.card } : head;
  if (!before) return next;
  const same = JSON.stringify(omit(before, 'card')) === JSON.stringify(omit(next, 'card'));
  return same && before.card === next.card ? before : next;
}

function omit<T extends object, K extends keyof T>(value: T, key: K): Omit<T, K> {
  return Object.fromEntries(Object.entries(value).filter(([k]) => k !== key)) as Omit<T, K>;
}

function without(redrawn: ReadonlyMap<string, Figure>, card: string): ReadonlyMap<string, Figure> {
  return new Map([...redrawn].filter(([key]) => !key.startsWith(`${card}/`)));
}
