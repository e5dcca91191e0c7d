import type { z } from 'zod'
import type { Issue } from './common'

type ZodIssue = z.core.$ZodIssue

/** `['keys', 3, 'frame']` → `keys[3].frame`. */
export function issuePath(parts: readonly PropertyKey[]): string {
  return parts.reduce<string>(
    (path, part) => (typeof part === 'number' ? `${path}[${part}]` : path ? `${path}.${String(part)}` : String(part)),
    '',
  )
}

/** Every fault by its own field. */
export function plainIssues(issues: readonly ZodIssue[]): Issue[] {
  return issues.map((issue) => ({ path: issuePath(issue.path), message: sentence(issue) }))
}

const BELONGS: Partial<Record<string, string>> = {
  string: 'A text',
  int: 'A whole number',
  boolean: 'Yes or no (true or false)',
  array: 'A list',
  object: 'A group of named fields',
}

/** The schema's own sentences stand; the package's stock phrases are put into ours. */
function sentence(issue: ZodIssue): string {
  if (issue.code === 'invalid_type' && /^Invalid input/.test(issue.message)) {
    const missing = /received undefined$/.test(issue.message)
    if (issue.expected === 'number') return missing ? 'Write a number here.' : 'This is not a number.'
    return missing ? 'This is missing.' : `${BELONGS[issue.expected] ?? 'Something else'} belongs here.`
  }
  if (issue.code === 'too_big' && /^Too big/.test(issue.message))
    return `${issue.inclusive === false ? 'Less than' : 'At most'} ${figure(issue.maximum)}${counted(issue.origin)}.`
  if (issue.code === 'too_small' && /^Too small/.test(issue.message))
    return `${issue.inclusive === false ? 'More than' : 'At least'} ${figure(issue.minimum)}${counted(issue.origin)}.`
  if (issue.code === 'unrecognized_keys') return `Unknown ${issue.keys.length === 1 ? 'field' : 'fields'}: ${issue.keys.join(', ')}.`
  if (issue.code === 'invalid_union' && /^Invalid (?:input|discriminator)/.test(issue.message)) return 'This is not one of the known kinds.'
  if (issue.code === 'invalid_value' && /^Invalid option/.test(issue.message)) return `One of: ${issue.values.join(', ')}.`
  return issue.message
}

const figure = (bound: number | bigint) => bound.toLocaleString('en-GB')
/** What a bound of this kind of thing counts. */
const counted = (origin: string) => (origin === 'string' ? ' characters' : origin === 'array' ? ' in the list' : '')
