import { render } from '@testing-library/react';
import { describe, expect, it } from 'vitest';

import MarkdownView from '@/components/markdown/markdown-view';

function view(text: string): HTMLElement {
  return render(<MarkdownView text={text} />).container;
}

describe('someone’s Markdown', () => {
  it('becomes paragraphs, lists, tables and mathematics', () => {
    const page = view(
      '# Task\n\nSweep $K$ and *write* down\n\n- the fold\n- the Hopf point\n\n| at | value |\n|---|---|\n| fold | 2 |\n\n$$\n\\frac{r}{K}\n$$',
    );
    expect(page.querySelector('h3')?.textContent).toBe('Task');
    expect(page.querySelectorAll('li')).toHaveLength(2);
    expect(page.querySelector('td')?.textContent).toBe('fold');
    expect(page.querySelectorAll('.katex').length).toBe(2);
    expect(page.querySelectorAll('.katex-display').length).toBe(1);
    expect(page.querySelector('.katex-error')).toBeNull();
  });

  it('keeps HTML as text', () => {
    const page = view('<script>alert(1)</script> <img src=x onerror=alert(1)> <b>bold</b>');
    expect(page.querySelector('script, img, b')).toBeNull();
    expect(page.textContent).toContain('<b>bold</b>');
  });

  it.each([
    ['[here](javascript:alert(1))', ''],
    ['[here](data:text/html,x)', ''],
    ['[here](vbscript:x)', ''],
    ['[here](https://example.org/a)', 'https://example.org/a'],
    ['[here](mailto:ada@example.org)', 'mailto:ada@example.org'],
  ])('lets %s lead to “%s”', (text, href) => {
    const link = view(text).querySelector('a');
    expect(link?.textContent).toBe('here');
    expect(link?.getAttribute('href') ?? '').toBe(href);
    expect(link?.getAttribute('rel')).toContain('noopener');
  });

  it('fetches no picture and follows no command of the mathematics', () => {
    const page = view(
      '![a map](https://example.org/a.png) $\\href{javascript:alert(1)}{x}$ $\\includegraphics{https://example.org/b.png}$',
    );
    expect(page.querySelector('img')).toBeNull();
    expect(page.textContent).toContain('a map');
    expect(page.querySelector('a')).toBeNull();
  });

  it('shows mathematics that it cannot read, and survives one that never ends', () => {
    expect(view('$\\frac{1$').textContent).toContain('frac');
    expect(view('$\\def\\a{\\a\\a}\\a$').textContent?.length).toBeGreaterThan(0);
  });
});
