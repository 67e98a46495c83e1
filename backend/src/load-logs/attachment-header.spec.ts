import { attachmentHeader } from './attachment-header.js';

describe('attachmentHeader', () => {
  it.each([
    ['log.csv', 'attachment; filename="log.csv"; filename*=UTF-8\'\'log.csv'],
    [
      'a "b"\r\nX: y.csv',
      'attachment; filename="a _b___X: y.csv"; filename*=UTF-8\'\'a%20%22b%22%0D%0AX%3A%20y.csv',
    ],
    [
      '../Sjø (1).csv',
      'attachment; filename=".._Sj_ (1).csv"; filename*=UTF-8\'\'..%2FSj%C3%B8%20%281%29.csv',
    ],
  ])('cannot be broken out of by %j', (name, header) => {
    expect(attachmentHeader(name)).toBe(header);
  });
});
