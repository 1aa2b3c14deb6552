/**
 * The addresses at which the client has a page, as patterns (`:name` stands for one segment). The server answers every
 * other address with the same page and the status 404. A test of the client's routes holds the two lists to each other.
 */
export const PAGE_PATHS = [
  '/',
  '/lots',
  '/lots/:code',
  '/lots/:code/buy',
  '/quotes',
  '/worth',
  '/desk',
  '/desk/certificates/:id',
  '/desk/deals',
  '/desk/laboratories',
  '/desk/members',
  '/desk/audit',
  '/admin/mails',
  '/deals',
  '/deals/:code',
  '/deals/:code/payment',
  '/sign-in',
  '/sign-up',
  '/sell',
  '/sell/:code',
  '/account',
  '/methods',
  '/cautions',
] as const;
