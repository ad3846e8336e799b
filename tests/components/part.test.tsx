import { render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';

import { part } from '@/lib/part';

const Greeting = ({ name }: { readonly name: string }) => <p>Dear {name}</p>;

describe('a part in a chunk of its own', () => {
  it('shows its fallback until it is there, and is there at once the next time', async () => {
    const load = vi.fn(async () => ({ default: Greeting }));
    const Part = part(load);
    const first = render(<Part name="Ada" fallback={<p>Opening</p>} />);
    expect(screen.getByText('Opening')).toBeTruthy();
    expect(await screen.findByText('Dear Ada')).toBeTruthy();
    first.unmount();
    render(<Part name="Rui" fallback={<p>Opening</p>} />);
    expect(screen.queryByText('Opening')).toBeNull();
    expect(screen.getByText('Dear Rui')).toBeTruthy();
    expect(load).toHaveBeenCalledTimes(1);
  });

  it('asks again after a failure', async () => {
    const load = vi.fn<() => Promise<{ default: typeof Greeting }>>();
    load.mockRejectedValueOnce(new Error('no connection')).mockResolvedValueOnce({ default: Greeting });
    const Part = part(load);
    await expect(Part.begin()).rejects.toThrow('no connection');
    await Part.begin();
    render(<Part name="Sanna" fallback={null} />);
    expect(screen.getByText('Dear Sanna')).toBeTruthy();
  });
});
