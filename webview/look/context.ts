import { createContext } from 'preact';
import { useContext } from 'preact/hooks';
import type { FromLookPage, NamedKind } from '../../src/core/protocol/panel';
import type { StepDescription } from '../../src/core/protocol/engine';
import type { Views } from '../figure/views';
import type { Folds } from './saved';
import type { Requests } from './state';

/** What cards need beside their own data. */
export interface LookContext {
  readonly post: (message: FromLookPage) => void;
  readonly copy: (text: string, what: string) => void;
  readonly views: Views;
  readonly requests: Requests;
  readonly steps: ReadonlyMap<string, StepDescription>;
  readonly names: readonly NamedKind[];
  readonly isOpen: (fold: Folds, key: string) => boolean;
  readonly setOpen: (fold: Folds, key: string, open: boolean) => void;
}

export const Look = createContext<LookContext | undefined>(undefined);

export function useLook(): LookContext {
  const look = useContext(Look);
  if (!look) throw new Error('a card was rendered outside of a look');
  return look;
}
