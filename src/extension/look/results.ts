import type { Card, CardError, RunEvent } from '../../core/protocol/engine';
import type { CardHead, CardState } from '../../core/protocol/panel';

interface Held {
  /** Result shown, and the signature of the step it belongs to. */
  card?: Card;
  cardOf?: string;
  /** What the run that is going on says; absent when none is. */
  live?: { state: 'waiting' | 'running' | 'cancelled' | 'failed'; fraction?: number; note?: string };
  failure?: CardError;
}

export type HeadState = Pick<CardHead, 'state' | 'fraction' | 'note' | 'failure'>;

/** Results of a look by step, and which of them still belong to the document. Knows no editor and no thread. */
export class Results {
  readonly #held = new Map<string, Held>();
  #signatures: ReadonlyMap<string, string> = new Map();
  /** True while the text cannot be read, so that nothing shown can be called current. */
  broken = false;

  /** The document's steps as they are now; forgets those that are gone. */
  setSignatures(signatures: ReadonlyMap<string, string>): void {
    this.#signatures = signatures;
    for (const id of this.#held.keys()) if (!signatures.has(id)) this.#held.delete(id);
  }

  card(id: string): Card | undefined {
    return this.#held.get(id)?.card;
  }

  isCurrent(id: string): boolean {
    const held = this.#held.get(id);
    return !this.broken && held?.card !== undefined && held.cardOf === this.#signatures.get(id);
  }

  /** Takes in an event of a run; gives back the id whose card changed, if one did. */
  apply(event: RunEvent): { readonly card?: string; readonly heads: boolean } {
    switch (event.type) {
      case 'waiting':
        for (const id of event.ids) {
          const held = this.#of(id);
          delete held.failure;
          if (!this.isCurrent(id) || held.card?.state !== 'done') held.live = { state: 'waiting' };
        }
        return { heads: true };
      case 'running': {
        if (!this.#signatures.has(event.id)) return { heads: false };
        const { fraction, note } = event;
        this.#of(event.id).live = { state: 'running', fraction, ...(note === undefined ? {} : { note }) };
        return { heads: false };
      }
      case 'input':
        return { heads: false };
      case 'card':
        return this.#take(event.card);
    }
  }

  #take(card: Card): { readonly card?: string; readonly heads: boolean } {
    const signature = this.#signatures.get(card.id);
    if (signature === undefined) return { heads: false };
    const held = this.#of(card.id);
    if (card.state === 'cancelled') {
      // A step the stopped run did not come to keeps the result it had.
      if (this.isCurrent(card.id) && held.card?.state === 'done') delete held.live;
      else held.live = { state: 'cancelled' };
      return { heads: true };
    }
    held.card = card;
    held.cardOf = signature;
    delete held.live;
    delete held.failure;
    return { card: card.id, heads: false };
  }

  /** Ends a run that broke off: whatever it had not finished is marked. */
  stop(state: 'cancelled' | 'failed', failure?: CardError): void {
    for (const held of this.#held.values()) {
      if (held.live?.state !== 'waiting' && held.live?.state !== 'running') continue;
      held.live = { state };
      if (failure) held.failure = failure;
    }
  }

  /** Forgets what a run says that no longer counts, because the document changed under it. */
  clearRun(): void {
    for (const held of this.#held.values()) {
      delete held.live;
      delete held.failure;
    }
  }

  /** State of a step's card as the page shows it. */
  head(id: string, off: boolean): HeadState {
    if (off) return { state: 'off' };
    const held = this.#held.get(id);
    if (held?.live) {
      const { state, ...progress } = held.live;
      return { state, ...progress, ...(held.failure ? { failure: held.failure } : {}) };
    }
    if (!held?.card) return { state: 'waiting' };
    const state: CardState = this.isCurrent(id) ? held.card.state : 'stale';
    return { state };
  }

  #of(id: string): Held {
    let held = this.#held.get(id);
    if (!held) this.#held.set(id, (held = {}));
    return held;
  }
}
