import { PRODUCTION } from './tower'

/** Every place of the product, as who sees the most of it. A page without a line here fails tests/browser/pages.test.ts. */
export interface Place {
  /** The file under pages/, without its ending. */
  page: string
  path: string
  /** Null: nobody is signed in. */
  as: 'animator' | 'supervisor' | 'coordinator' | 'guest' | 'keeper' | null
  /** An installation without anybody in it. */
  empty?: boolean
}

const shot = (code: string) => `/p/${PRODUCTION}/shots/${code}`

export const places: Place[] = [
  { page: 'index', path: '/', as: 'supervisor' },
  { page: 'sign-in', path: '/sign-in', as: null },
  { page: 'first-keeper', path: '/first-keeper', as: null, empty: true },
  { page: 'invitation', path: '/invitation', as: null },
  { page: 'reset', path: '/reset', as: null },
  { page: 'me', path: '/me', as: 'animator' },
  { page: 'accounts', path: '/accounts', as: 'keeper' },
  { page: 'mail-room/index', path: '/mail-room', as: 'keeper' },
  { page: 'mail-room/[letter]', path: '/mail-room/:letter', as: 'keeper' },
  { page: 'p/[production]/index', path: `/p/${PRODUCTION}`, as: 'supervisor' },
  { page: 'p/[production]/index', path: `/p/${PRODUCTION}?desk=settled&words=nothing+like+this`, as: 'guest' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=pendulum&body=bob&length=1&amplitude=40&beside=4,16&have=60`, as: 'guest' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=odd-rule&way=4&slope=20&roll=ball&gravity=moon&on=1&beside=1,2,8`, as: 'supervisor' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=slow-in&way=3&speed=4&beside=1`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=bounce&way=2&back=60&bounces=8&beside=1,4`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=flight&speed=8&angle=-20&landing=12&beside=2,30`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=over-edge&body=block&width=0.6&height=2&lean=2&brink=5&have=40`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=swing-decay&body=hung-rod&length=1&amplitude=40&swings=3&lost=20`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=spin&rate=20&turns=3&have=40`, as: 'animator' },
  { page: 'p/[production]/bench', path: `/p/${PRODUCTION}/bench?law=flight&speed=5&angle=-5&landing=0`, as: 'animator' },
  { page: 'p/[production]/people', path: `/p/${PRODUCTION}/people`, as: 'coordinator' },
  { page: 'p/[production]/people', path: `/p/${PRODUCTION}/people`, as: 'guest' },
  { page: 'p/[production]/shots/new', path: `/p/${PRODUCTION}/shots/new`, as: 'coordinator' },
  { page: 'p/[production]/shots/[code]/index', path: shot('CLK-110'), as: 'supervisor' },
  { page: 'p/[production]/shots/[code]/index', path: shot('CHN-010'), as: 'guest' },
  { page: 'p/[production]/shots/[code]/index', path: shot('CLK-150'), as: 'animator' },
  { page: 'p/[production]/shots/[code]/index', path: shot('CLK-140'), as: 'coordinator' },
  { page: 'p/[production]/shots/[code]/post', path: `${shot('CLK-110')}/post`, as: 'animator' },
  { page: 'p/[production]/shots/[code]/claim', path: `${shot('CLK-110')}/claim`, as: 'supervisor' },
  { page: 'p/[production]/shots/[code]/claim', path: `${shot('BRK-070')}/claim`, as: 'supervisor' },
  { page: 'p/[production]/shots/[code]/edit', path: `${shot('CHN-120')}/edit`, as: 'coordinator' },
]
