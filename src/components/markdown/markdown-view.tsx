import 'katex/dist/katex.min.css';

import ReactMarkdown from 'react-markdown';
import rehypeKatex from 'rehype-katex';
import remarkGfm from 'remark-gfm';
import remarkMath from 'remark-math';

/** Headings of a text stand below those of the page that shows it. */
const COMPONENTS = {
  h1: 'h3',
  h2: 'h4',
  h3: 'h5',
  h4: 'h6',
  h5: 'h6',
  a: ({ href, children }: { readonly href?: string; readonly children?: React.ReactNode }) => (
    <a href={href} target="_blank" rel="noopener noreferrer nofollow">
      {children}
    </a>
  ),
  // A picture would be fetched from wherever its writer says.
  img: ({ alt }: { readonly alt?: string }) => <span>{alt}</span>,
  // A table scrolls within its text.
  table: ({ children }: { readonly children?: React.ReactNode }) => (
    <div className="overflow-x-auto">
      <table>{children}</table>
    </div>
  ),
} as const;

const KATEX = { trust: false, strict: 'ignore', maxExpand: 100, throwOnError: false } as const;

/**
 * Markdown as elements: HTML in it stays text, addresses other than web and mail lead nowhere, mathematics
 * between dollars is typeset without commands that fetch or link.
 */
export default function MarkdownView({ text }: { readonly text: string }) {
  return (
    <div className="markdown">
      <ReactMarkdown
        remarkPlugins={[remarkGfm, remarkMath]}
        rehypePlugins={[[rehypeKatex, KATEX]]}
        components={COMPONENTS}
      >
        {text}
      </ReactMarkdown>
    </div>
  );
}
