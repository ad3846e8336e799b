import type { MailContent, MailPassage } from '../models/mail-message';

export interface RenderedMail {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Addresses at the foot of mail that can be turned off. */
export interface MailFooter {
  readonly settingsUrl: string;
  readonly unsubscribeUrl: string;
}

const PRODUCT = 'Moiety, a workbench for structured populations';
const ESCAPES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Control characters and those that turn the reading direction, which could make a line say something else. */
const INVISIBLE = /[\p{Cc}\u200e\u200f\u202a-\u202e\u2066-\u2069]/gu;

const escape = (text: string) => text.replace(/[&<>"']/g, (mark) => ESCAPES[mark] ?? '');
const onOneLine = (text: string) => text.replace(INVISIBLE, ' ').replace(/\s+/g, ' ').trim();

const FONT = "font-family:Georgia,'Times New Roman',serif";
const INK = 'color:#1e2a2d';
const ACCENT = '#1f5f4e';

const paragraph = (inner: string) => `<p style="margin:0 0 14px;line-height:1.5">${inner}</p>`;
const link = (url: string, label: string) =>
  `<a href="${escape(url)}" target="_blank" rel="noopener" style="color:${ACCENT}">${escape(label)}</a>`;
const button = (url: string, label: string) =>
  `<a href="${escape(url)}" target="_blank" rel="noopener" style="display:inline-block;padding:9px 16px;border-radius:6px;background:${ACCENT};color:#ffffff;text-decoration:none">${escape(label)}</a>`;

const passageText = (passage: MailPassage) =>
  'text' in passage ? passage.text : `${passage.label}:\n${passage.url}`;
const passageHtml = (passage: MailPassage) =>
  paragraph('text' in passage ? escape(passage.text) : button(passage.url, passage.label));

function footerText(footer: MailFooter | null): string {
  const lines = footer
    ? ['', `What is mailed to you: ${footer.settingsUrl}`, `Stop this mail: ${footer.unsubscribeUrl}`]
    : [];
  return ['-- ', PRODUCT, ...lines].join('\n');
}

function footerHtml(footer: MailFooter | null): string {
  const links = footer
    ? `<br>${link(footer.settingsUrl, 'What is mailed to you')} · ${link(footer.unsubscribeUrl, 'Stop this mail')}`
    : '';
  return `<p style="margin:22px 0 0;padding-top:12px;border-top:1px solid #ddd7c9;font-size:13px;color:#5c696b">${PRODUCT}${links}</p>`;
}

function page(title: string, inner: string): string {
  return (
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="color-scheme" content="light">` +
    `<title>${escape(title)}</title></head><body style="margin:0;background:#fbfaf6">` +
    `<div style="max-width:36em;margin:0 auto;padding:24px;${FONT};font-size:16px;${INK}">${inner}</div></body></html>\n`
  );
}

const greeting = (name: string) => (onOneLine(name) ? `Hello ${onOneLine(name)},` : 'Hello,');

function renderOne(content: MailContent, footer: MailFooter | null): RenderedMail {
  const subject = onOneLine(content.subject);
  const hello = greeting(content.name);
  return {
    subject,
    text: [hello, ...content.passages.map(passageText), footerText(footer)].join('\n\n') + '\n',
    html: page(
      subject,
      paragraph(escape(hello)) + content.passages.map(passageHtml).join('') + footerHtml(footer),
    ),
  };
}

/** Several pieces of news as one message, each under its own heading. */
function renderBundle(contents: readonly MailContent[], footer: MailFooter | null): RenderedMail {
  const subject = `${contents.length} pieces of news from Moiety`;
  const hello = greeting(contents[0]?.name ?? '');
  const texts = contents.map((one) => {
    const heading = onOneLine(one.subject);
    return [`${heading}\n${'-'.repeat(Math.min(heading.length, 60))}`, ...one.passages.map(passageText)].join(
      '\n\n',
    );
  });
  const sections = contents.map(
    (one) =>
      `<h2 style="margin:20px 0 8px;font-size:19px;font-weight:600">${escape(onOneLine(one.subject))}</h2>` +
      one.passages.map(passageHtml).join(''),
  );
  return {
    subject,
    text: [hello, ...texts, footerText(footer)].join('\n\n') + '\n',
    html: page(subject, paragraph(escape(hello)) + sections.join('') + footerHtml(footer)),
  };
}

/** A message as plain text and as HTML. Everything that people wrote is escaped. */
export function renderMail(contents: readonly MailContent[], footer: MailFooter | null): RenderedMail {
  const [only] = contents;
  return contents.length === 1 && only ? renderOne(only, footer) : renderBundle(contents, footer);
}
