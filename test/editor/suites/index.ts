import type { EditorSuite } from '../runner';
import { workbenchSuite } from './workbench';

/** Every suite, in the order of the run. */
export const suites: readonly EditorSuite[] = [workbenchSuite];
