import { complaintsOf, refusedBy } from '~/utils/refusal'
import type { Refused } from '~/utils/refusal'

/**
 * Sending a form: one at a time, what the server says of each field beside that field, and the focus on the first that is
 * wrong. Put `form` on the form itself.
 */
export function useSubmit() {
  const form = ref<HTMLFormElement | null>(null)
  const busy = ref(false)
  /** What to change, by the field's name. */
  const errors = ref<Record<string, string>>({})
  /** What went wrong with the whole. */
  const problem = ref('')
  /** After a 409: what stands now, as somebody else left it. */
  const current = ref<unknown>()

  /** Runs `send` and answers what it gave, or undefined after a refusal. @param fields names that the form shows */
  async function submit<T>(send: () => Promise<T>, fields: readonly string[] = []): Promise<T | undefined> {
    if (busy.value) return undefined
    busy.value = true
    errors.value = {}
    problem.value = ''
    current.value = undefined
    try {
      return await send()
    } catch (failure) {
      tell(refusedBy(failure), fields)
      await nextTick()
      form.value?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus()
      return undefined
    } finally {
      busy.value = false
    }
  }

  function tell(refused: Refused, fields: readonly string[]) {
    current.value = refused.current ?? undefined
    errors.value = complaintsOf(refused.issues)
    // Whatever no field of the form stands for is said for the whole.
    const homeless = refused.issues.find(({ path }) => !fields.includes(path))
    if (refused.issues.length === 0 || homeless) problem.value = homeless?.message ?? refused.message
  }

  /** What stands in the form right now, by name: typed, or filled in by a password manager before the page came alive. */
  function filled<Name extends string>(...names: Name[]): Record<Name, string> {
    const data = new FormData(form.value ?? undefined)
    return Object.fromEntries(names.map((name) => [name, String(data.get(name) ?? '')])) as Record<Name, string>
  }

  return { form, busy, errors, problem, current, submit, filled }
}
