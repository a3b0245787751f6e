import type { SavedViews } from '../figure/views';

/** What a page keeps through being thrown away; a version of its own, read with care since an older page may have written it. */
export interface SavedPage {
  readonly version: 1;
  readonly scroll: number;
  readonly collapsed: readonly string[];
  /** Cards whose parameters are open, cards whose details are, figures shown as text. */
  readonly params: readonly string[];
  readonly details: readonly string[];
  readonly asText: readonly string[];
  readonly views: SavedViews;
}

export const NOTHING_SAVED: SavedPage = {
  version: 1,
  scroll: 0,
  collapsed: [],
  params: [],
  details: [],
  asText: [],
  views: { views: {}, unlinked: [] },
};

export function readSaved(raw: unknown): SavedPage {
  const page = raw as Partial<SavedPage> | null | undefined;
  return page?.version === 1 ? { ...NOTHING_SAVED, ...page } : NOTHING_SAVED;
}

export type Folds = 'collapsed' | 'params' | 'details' | 'asText';
