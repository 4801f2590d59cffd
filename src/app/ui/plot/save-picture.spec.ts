import { withStyle } from './save-picture';

describe('saved picture', () => {
  it('carries its style inside the outermost element', () => {
    expect(withStyle('<svg width="2" viewBox="0 0 2 2"><svg></svg></svg>', 'a{b:c}')).toBe(
      '<svg width="2" viewBox="0 0 2 2"><style>a{b:c}</style><svg></svg></svg>',
    );
  });
});
