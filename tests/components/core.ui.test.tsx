import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { bandShares, Core } from '@/components/pierce/core.tsx';

describe('the core', () => {
  it('has a band for each stage that adds depth, and none for the hold after the hole is through', () => {
    render(<Core bands={[0.2, 0.55, 1, 1]} reserve={2.1} size={48} />);
    const bands = screen.getAllByTestId('core-band');
    expect(bands).toHaveLength(3);
    const bottom = bands.reduce(
      (low, band) => Math.max(low, Number(band.getAttribute('y')) + Number(band.getAttribute('height'))),
      0,
    );
    expect(bottom).toBeCloseTo(48);
  });

  it('draws more tail for more reserve, and none for a pierce that never gets through', () => {
    const lines = (reserve: number | null) => {
      const { container, unmount } = render(<Core bands={[0.5]} reserve={reserve} size={48} />);
      const drawn = container.querySelector('[data-testid=core-reserve]')?.getAttribute('d')?.split('M').length ?? 0;
      unmount();
      return drawn;
    };
    expect(lines(2.4)).toBeGreaterThan(lines(1.5));
    expect(lines(null)).toBe(0);
  });

  it('says in words what it shows, unless words beside it do', () => {
    const { rerender } = render(<Core bands={[0.5, 1]} reserve={null} size={48} />);
    expect(screen.getByRole('img', { name: 'Core: 2 bands of depth, not through' })).toBeTruthy();
    rerender(<Core bands={[0.5, 1]} reserve={2} size={48} silent />);
    expect(screen.queryByRole('img')).toBeNull();
  });

  it('never lets a band run backwards or past the bottom', () => {
    expect(bandShares([0.4, 0.3, Number.NaN, 1.7])).toEqual([
      { from: 0, to: 0.4 },
      { from: 0.4, to: 1 },
    ]);
  });
});
