import { resolve } from 'node:path'
import { useRuntimeConfig } from '#imports'

/** The installation's settings, as the start script left them in the environment (README.md has the table). */
export interface Settings {
  dataDir: string
  /** Public address without a slash at the end; links in letters begin with it. */
  baseUrl: string
  demoWanted: boolean
  mailUrl: string
  mailFrom: string
  trustProxy: boolean
  sessionSecret: string
}

export function settings(): Settings {
  const config = useRuntimeConfig()
  // Nitro turns "on"/"true" style values into what they look like; ask for the text.
  const said = (value: unknown) => String(value ?? '').toLowerCase()
  return {
    dataDir: resolve(String(config.dataDir || '.data')),
    baseUrl: String(config.baseUrl || '').replace(/\/+$/, ''),
    demoWanted: said(config.demo) !== 'off' && said(config.demo) !== 'false',
    mailUrl: String(config.mailUrl ?? ''),
    mailFrom: String(config.mailFrom ?? ''),
    trustProxy: said(config.trustProxy) === 'on' || said(config.trustProxy) === 'true',
    sessionSecret: String(config.session.password ?? ''),
  }
}
