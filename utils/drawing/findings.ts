import type { FindingName } from '~/utils/contracts/take'

/** One finding's name as a string: its kind and frames, by which waivers and flags point at it. */
export const findingKey = ({ kind, frames }: FindingName): string => `${kind}:${frames.join(',')}`
