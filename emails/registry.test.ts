// @vitest-environment jsdom
import { describe, expect, it } from 'vitest';
import { cautionTexts } from '@/components/caution/caution-texts';
import { MAIL_KINDS } from '@/lib/schemas/mail-payloads';
import { MAIL_PAYLOADS } from '@/tests/factories/mail-payloads';
import { LINE_LENGTH } from './layout/wrap';
import { renderMail } from './registry';

const URL_OF_INSTALLATION = 'https://stepwell.example.org/base';
const context = { url: URL_OF_INSTALLATION, recipientName: 'Mara Lindqvist' };
const documentOf = (html: string): Document => new DOMParser().parseFromString(html, 'text/html');
/** What a reader sees of the HTML, its white space as one blank. */
const seen = (text: string | null | undefined): string => (text ?? '').replace(/\s+/g, ' ').trim();

describe.each(MAIL_KINDS)('%s', (kind) => {
  const mail = renderMail(kind, MAIL_PAYLOADS[kind], context);
  const page = documentOf(mail.html);

  it('reads as kept', async () => {
    await expect(`Subject: ${mail.subject}\n\n${mail.text}`).toMatchFileSnapshot(`snapshots/${kind}.txt`);
    expect(mail.html).toMatchSnapshot();
  });

  it('says the same in both forms', () => {
    const text = seen(mail.text.replaceAll('\n| ', '\n')).toLowerCase();
    for (const part of page.querySelectorAll('h1, body > table p, th, td:not(:has(*))')) {
      for (const piece of [...part.childNodes].map((node) => seen(node.textContent).toLowerCase())) {
        if (piece !== '' && piece !== 'stepwell' && piece !== 'or open this address:') {
          expect(text).toContain(piece.replace(/^caution\. /, ''));
        }
      }
    }
  });

  it('links into the installation alone, and fetches nothing', () => {
    const links = [...page.querySelectorAll('a')].map((link) => link.getAttribute('href') ?? '');
    expect(links.length).toBeGreaterThan(0);
    for (const link of links) expect(link.startsWith(`${URL_OF_INSTALLATION}/`)).toBe(true);
    for (const address of mail.text.match(/https?:\/\/\S+/g) ?? []) {
      expect(address.startsWith(URL_OF_INSTALLATION)).toBe(true);
    }
    expect(mail.text).toContain(`\n${links[0]}\n`);
    expect(page.querySelector('img, script, link, iframe, form, video, object')).toBeNull();
    expect(mail.html).not.toMatch(/url\(|@import|@font-face|background=/i);
  });

  it('keeps its text within 72 columns, addresses apart', () => {
    for (const line of mail.text.split('\n')) {
      if (!/^https?:\/\/\S+$/.test(line)) expect([...line].length).toBeLessThanOrEqual(LINE_LENGTH);
    }
  });

  it('has a subject and a preview without a dose', () => {
    const preview = seen(page.querySelector('body > div')?.textContent);
    for (const line of [mail.subject, preview]) {
      expect(line).toMatch(/^[^\p{Cc}]{10,110}$/u);
      expect(line).not.toMatch(/\d\s*mg/);
    }
  });

  it('says for whom it is and why', () => {
    expect(seen(mail.text)).toMatch(/For Mara Lindqvist, because [^.]+\./);
  });

  it('carries the caution wherever it carries a dose', () => {
    const hasDose = mail.text.includes('60 mg');
    expect(hasDose).toBe(kind.startsWith('dose-released'));
    if (!hasDose) return;
    for (const sentence of [cautionTexts.mail.title, ...cautionTexts.mail.sentences]) {
      expect(seen(mail.text.replaceAll('\n| ', ' '))).toContain(sentence);
      expect(seen(page.body.textContent)).toContain(sentence);
    }
  });

  it('carries the head of the chain of the trial it is about', () => {
    const payload = MAIL_PAYLOADS[kind];
    if (!('chainHead' in payload)) return;
    expect(mail.text).toContain(`\n${payload.chainHead}\n`);
    expect(page.body.textContent).toContain(payload.chainHead);
  });

  it('is small', () => {
    // Common practice, no source: mail programs cut messages off at about 100 kB.
    expect(Buffer.byteLength(mail.html)).toBeLessThan(30_000);
  });
});

describe('renderMail', () => {
  it('shows hostile texts as they are, in both forms', () => {
    const name = `<img src=x onerror=alert(1)> "Q" 'q' & </td></style><script>alert(2)</script>`;
    const payload = { ...MAIL_PAYLOADS['dose-released'], signers: [name, 'x'.repeat(120)], unit: '{<b>&"}' };
    const mail = renderMail('dose-released', payload, { ...context, recipientName: name });
    const page = documentOf(mail.html);
    expect(page.querySelectorAll('img, script, b')).toHaveLength(0);
    expect(seen(page.body.textContent)).toContain(`For ${name}, because`);
    expect(seen(page.body.textContent)).toContain(`60 {<b>&"}`);
    expect(
      [...page.querySelectorAll('*')].flatMap((each) => [...each.attributes]).map((each) => each.name),
    ).not.toContain('onerror');
    expect(page.querySelectorAll('table').length).toBe(
      documentOf(renderMail('dose-released', MAIL_PAYLOADS['dose-released'], context).html).querySelectorAll(
        'table',
      ).length,
    );
    expect(seen(mail.text)).toContain(`For ${name}, because`);
    for (const line of mail.text.split('\n')) {
      if (!/^https?:/.test(line)) expect([...line].length).toBeLessThanOrEqual(LINE_LENGTH);
    }
  });

  it('prints powers of ten where the design asks for them', () => {
    const payload = {
      ...MAIL_PAYLOADS['dose-released'],
      dose: '25000',
      unit: '[CFU]',
      doseNotation: 'powers-of-ten',
    };
    expect(renderMail('dose-released', payload, context).text).toContain('\n    2.5 × 10⁴ CFU\n');
  });

  it('writes to somebody whose name is not known', () => {
    const mail = renderMail('invitation', MAIL_PAYLOADS.invitation, { ...context, recipientName: null });
    expect(mail.text).toContain('For the owner of this address, because');
  });

  it('says one place as one', () => {
    const mail = renderMail('dose-released', { ...MAIL_PAYLOADS['dose-released'], cohortSize: 1 }, context);
    expect(mail.text).toMatch(/^Places +1 subject$/m);
  });

  it('tells a waiting starting dose from a complete cohort', () => {
    const payload = { ...MAIL_PAYLOADS['recommendation-ready'], afterCohort: null };
    const mail = renderMail('recommendation-ready', payload, context);
    expect(mail.subject).toBe('WELL-02: the starting dose waits for review');
  });

  it('refuses a kind it does not know and a payload that is not of its kind', () => {
    expect(() => renderMail('newsletter', {}, context)).toThrow();
    expect(() => renderMail('dose-released', MAIL_PAYLOADS['trial-halted'], context)).toThrow();
    expect(() =>
      renderMail('trial-halted', { ...MAIL_PAYLOADS['trial-halted'], reason: 'x' }, context),
    ).toThrow();
    expect(() => renderMail('trial-halted', null, context)).toThrow();
  });
});
