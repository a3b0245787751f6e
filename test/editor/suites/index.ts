import type { EditorSuite } from '../runner';
import { dataViewSuite } from './data-view';
import { demoSuite, lookSuite } from './look';
import { workbenchSuite } from './workbench';

/** Every suite, in the order of the run. */
export const suites: readonly EditorSuite[] = [workbenchSuite, dataViewSuite, lookSuite, demoSuite];
