import { part } from '@/lib/part';

const MarkdownView = part(() => import('./markdown-view'));

/** Someone's words with Markdown and mathematics; plain until the chunk that renders them has come. */
export function Markdown({ text }: { readonly text: string }) {
  return <MarkdownView text={text} fallback={<p className="whitespace-pre-wrap">{text}</p>} />;
}
