import type { LevaPanel } from 'leva';
import type { ComponentProps } from 'react';

type Theme = NonNullable<ComponentProps<typeof LevaPanel>['theme']>;

/** leva in the page's own tokens: no panel, no shadow, no colours of its own. */
export const LEVA_THEME: Theme = {
  colors: {
    elevation1: 'transparent',
    elevation2: 'transparent',
    elevation3: 'var(--raised)',
    accent1: 'var(--accent)',
    accent2: 'var(--accent)',
    accent3: 'var(--accent)',
    highlight1: 'var(--muted)',
    highlight2: 'var(--ink)',
    highlight3: 'var(--ink)',
    vivid1: 'var(--caution)',
    folderWidgetColor: 'var(--muted)',
    folderTextColor: 'var(--ink)',
    toolTipBackground: 'var(--ink)',
    toolTipText: 'var(--paper)',
  },
  radii: { xs: '4px', sm: '6px', lg: '8px' },
  space: { xs: '0px', sm: '0px', md: '0px', rowGap: '2px', colGap: '8px' },
  fonts: { mono: 'inherit', sans: 'inherit' },
  fontSizes: { root: 'inherit', toolTip: '13px' },
  sizes: { rootWidth: '100%', controlWidth: '100%', rowHeight: '32px' },
  shadows: { level1: 'none', level2: 'none' },
  borderWidths: { root: '0px', input: '1px', focus: '2px', hover: '1px', active: '2px', folder: '0px' },
  fontWeights: { label: 'inherit', folder: '600', button: '500' },
};
