const segment = (value: string) => encodeURIComponent(value);

/** Every address of the client, built in one place so that a link can never be misspelt. */
export const paths = {
  home: () => '/',
  register: () => '/lots',
  lot: (code: string) => `/lots/${segment(code)}`,
  purchase: (code: string) => `/lots/${segment(code)}/buy`,
  sell: () => '/sell',
  draft: (code: string) => `/sell/${segment(code)}`,
  deals: () => '/deals',
  deal: (code: string) => `/deals/${segment(code)}`,
  dealPayment: (code: string, said: 'returned' | 'stopped') => `/deals/${segment(code)}/payment?said=${said}`,
  desk: () => '/desk',
  deskCase: (id: string) => `/desk/certificates/${segment(id)}`,
  deskDeals: () => '/desk/deals',
  deskLaboratories: () => '/desk/laboratories',
  deskMembers: (query?: string) => (query ? `/desk/members?query=${segment(query)}` : '/desk/members'),
  deskAudit: () => '/desk/audit',
  adminMails: () => '/admin/mails',
  quotes: () => '/quotes',
  worth: () => '/worth',
  methods: () => '/methods',
  cautions: () => '/cautions',
  signIn: (next?: string) => (next ? `/sign-in?next=${segment(next)}` : '/sign-in'),
  signUp: (next?: string) => (next ? `/sign-up?next=${segment(next)}` : '/sign-up'),
  account: () => '/account',
} as const;

/** Where to go after signing in: only ever an address of our own, so that a link cannot send a member elsewhere. */
export function safeNext(next: string | null): string {
  if (next === null || !/^\/(?![/\\])/.test(next)) return paths.home();
  // Browsers drop control characters and read a backslash as a slash: "/\t/elsewhere" would leave the site.
  const isPlain = [...next].every((character) => character > ' ' && character !== '\\');
  return isPlain ? next : paths.home();
}
