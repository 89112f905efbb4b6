import { caughtMail } from '@/lib/queries/caught-mails';
import { caughtMailIdSchema } from '@/lib/schemas/caught-mail-address';
import { hidden } from '@/lib/server/hidden';
import { problemOf } from '@/lib/server/problem';

/**
 * Nothing runs, nothing is fetched, styles stand in the mail itself. A link opens a page of its own outside the
 * sandbox, as it would from a mail program. Only this installation may frame it: frame-ancestors counts before the
 * X-Frame-Options that every answer has (CSP level 3, 6.4.2).
 */
const POLICY = [
  'sandbox allow-popups allow-popups-to-escape-sandbox',
  `default-src 'none'`,
  `style-src 'unsafe-inline'`,
  `form-action 'none'`,
  `base-uri 'none'`,
  `frame-ancestors 'self'`,
].join('; ');

/**
 * The HTML of a caught mail as it was sent. Open to every visitor like the list of caught mails, in demo and test
 * installations alone; there is no reader to authorise.
 */
export async function GET(request: Request, context: { params: Promise<{ id: string }> }): Promise<Response> {
  try {
    const id = caughtMailIdSchema.safeParse((await context.params).id);
    const mail = id.success ? await caughtMail(id.data) : null;
    if (mail === null || mail.html === '') throw hidden();
    return new Response(mail.html, {
      headers: {
        'content-type': 'text/html; charset=utf-8',
        'content-security-policy': POLICY,
        'cache-control': 'no-store',
      },
    });
  } catch (error) {
    return problemOf(request, error, null);
  }
}
