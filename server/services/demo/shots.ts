import { breakwater } from './breakwater'
import { chandlery } from './chandlery'
import { clockTower } from './clockTower'
import type { DemoSequence } from './story'

/** The demo's shots, in story order. */
export const demoSequences: DemoSequence[] = [breakwater, chandlery, clockTower]
