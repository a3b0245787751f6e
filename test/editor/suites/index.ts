import type { EditorSuite } from '../runner';
import { dataViewSuite } from './data-view';
import { largeFileSuite } from './large-file';
import { demoSuite, lookSuite } from './look';
import { looksViewSuite } from './looks-view';
import { missingRateSuite } from './missing-rate';
import { picturesSuite } from './pictures';
import { workbenchSuite } from './workbench';

/** Every suite, in the order of the run. */
export const suites: readonly EditorSuite[] = [
  workbenchSuite,
  dataViewSuite,
  missingRateSuite,
  lookSuite,
  demoSuite,
  picturesSuite,
  looksViewSuite,
  largeFileSuite,
];
