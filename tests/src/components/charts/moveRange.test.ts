import { describe, expect, it } from 'vitest';
import { panned, zoomed } from '@/components/charts/moveRange';

const whole = { fromHz: 0, toHz: 1000 };

describe('moveRange', () => {
  it('zooms about the middle', () => {
    expect(zoomed({ fromHz: 400, toHz: 600 }, whole, 0.5)).toEqual({ fromHz: 450, toHz: 550 });
  });

  it('zooms out no further than the whole', () => {
    expect(zoomed({ fromHz: 400, toHz: 900 }, whole, 10)).toEqual(whole);
  });

  it('stays inside the whole when zooming out beside its edge', () => {
    expect(zoomed({ fromHz: 0, toHz: 100 }, whole, 2)).toEqual({ fromHz: 0, toHz: 200 });
  });

  it('pans by a share of the width and stops at the edge', () => {
    expect(panned({ fromHz: 200, toHz: 400 }, whole, 0.5)).toEqual({ fromHz: 300, toHz: 500 });
    expect(panned({ fromHz: 700, toHz: 900 }, whole, 1)).toEqual({ fromHz: 800, toHz: 1000 });
  });
});
