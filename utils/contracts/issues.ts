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

/** The schema's own sentences stand; the package's stock phrases are put into ours. */
function sentence(issue: ZodIssue): string {
  if (issue.code === 'invalid_type' && /^Invalid input/.test(issue.message)) {
    const missing = /received undefined$/.test(issue.message)
    if (issue.expected === 'number') return missing ? 'Write a number here.' : 'This is not a number.'
    return missing ? 'This is missing.' : `Expected ${issue.expected} here.`
  }
  if (issue.code === 'unrecognized_keys') return `Unknown ${issue.keys.length === 1 ? 'field' : 'fields'}: ${issue.keys.join(', ')}.`
  if (issue.code === 'invalid_union') return 'This is not one of the known kinds.'
  if (issue.code === 'invalid_value' && /^Invalid option/.test(issue.message)) return `One of: ${issue.values.join(', ')}.`
  return issue.message
}
