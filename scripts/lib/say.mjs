/**
 * A stop that the person at the keyboard can do something about: one sentence, exit 1, no stack.
 * Everything else that is thrown is a bug and keeps its stack.
 */
export class PlainStop extends Error {
  /** @param {string} message one whole sentence */
  constructor(message) {
    super(message)
    this.name = 'PlainStop'
  }
}

/**
 * Runs a script's main function and turns what it throws into an exit code.
 * @param {() => Promise<number | void>} main answers the exit code; nothing means 0
 * @returns {Promise<void>}
 */
export async function runScript(main) {
  try {
    process.exitCode = (await main()) ?? 0
  } catch (error) {
    if (error instanceof PlainStop) console.error(error.message)
    else console.error(error)
    process.exitCode = 1
  }
}

/** The oldest Node.js that the packages run on, as package.json's `engines` says. */
const OLDEST_NODE = [20, 19]

/**
 * @param {string} version such as `process.versions.node`
 * @returns {void} throws a PlainStop when the version is too old
 */
export function requireNode(version) {
  const [major = 0, minor = 0] = version.split('.').map(Number)
  const [needMajor, needMinor] = OLDEST_NODE
  if (major > needMajor || (major === needMajor && minor >= needMinor)) return
  throw new PlainStop(`Tiltyard needs Node.js ${OLDEST_NODE.join('.')} or newer; this is ${version}.`)
}
