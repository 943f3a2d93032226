import { attachmentHeader, readRange } from './send-file';

describe('attachmentHeader', () => {
  it.each([
    ['take.wav', `attachment; filename="take.wav"; filename*=UTF-8''take.wav`],
    ['Höhe "1".wav', `attachment; filename="H_he _1_.wav"; filename*=UTF-8''H%C3%B6he%20%221%22.wav`],
    ["it's (1)*.wav", `attachment; filename="it's (1)*.wav"; filename*=UTF-8''it%27s%20%281%29%2A.wav`],
    ['50%.wav', `attachment; filename="50_.wav"; filename*=UTF-8''50%25.wav`],
  ])('writes %s after RFC 6266 and RFC 8187', (name, header) => {
    expect(attachmentHeader(name)).toBe(header);
  });

  it('lets no name end the header', () => {
    expect(attachmentHeader('a\r\nSet-Cookie: x=1.wav')).not.toMatch(/[\r\n]/);
  });
});

describe('readRange', () => {
  // RFC 9110, section 14.1.2: the examples for a file of 10,000 bytes
  it.each([
    ['bytes=0-499', { from: 0, to: 499 }],
    ['bytes=500-999', { from: 500, to: 999 }],
    ['bytes=-500', { from: 9_500, to: 9_999 }],
    ['bytes=9500-', { from: 9_500, to: 9_999 }],
    ['bytes=-99999', { from: 0, to: 9_999 }],
    ['bytes=0-0,-1', null],
    ['lines=1-2', null],
    ['bytes=-', null],
    [undefined, null],
  ])('reads %s', (header, range) => {
    expect(readRange(header, 10_000)).toEqual(range);
  });

  it.each(['bytes=10000-', 'bytes=5-4', 'bytes=-0'])('refuses %s', (header) => {
    expect(() => readRange(header, 10_000)).toThrow('no such part');
  });
});
