import { matchRoutes } from 'react-router-dom';
import { describe, expect, it } from 'vitest';
import { paths } from './paths';
import { routes } from './router';

const ID = '0193f1d2-7c00-7000-8000-000000000001';

describe('the router', () => {
  it.each(Object.entries(paths))('has a page at the address of %s', (_name, { pattern }) => {
    const address = pattern.replace(/:\w+/g, ID);
    const matched = matchRoutes(routes, address)?.at(-1)?.route;
    expect(matched).toBeDefined();
    expect(matched?.path).not.toBe('*');
  });

  it('builds links that its own patterns match', () => {
    expect(paths.fitPart.to('v', 'p')).toBe('/vessels/v/positions/p/fit');
    expect(paths.signIn.to('/vessels/v?x=1')).toBe('/sign-in?from=%2Fvessels%2Fv%3Fx%3D1');
    expect(paths.curve.to('a b')).toBe('/reference/curves/a%20b');
  });

  it('sends an unknown address to the not-found page', () => {
    expect(matchRoutes(routes, '/nowhere')?.at(-1)?.route.path).toBe('*');
  });
});
