/** Where the page of a single-use link stands, by what the link is for. */
const LINK_PAGES = {
  'first-administrator': 'setup',
  invitation: 'invitation',
  'password-reset': 'reset',
} as const;

/** The path of the page on which a single-use link is used. */
export function linkPath(purpose: keyof typeof LINK_PAGES, token: string): string {
  return `/${LINK_PAGES[purpose]}/${token}`;
}

/** Mails that carry a link: its token is wiped from the outbox once the mail was sent, overtaken or given up. */
export const LINK_MAIL_KINDS = ['invitation', 'password-reset'] as const;
