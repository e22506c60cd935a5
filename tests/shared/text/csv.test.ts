import { describe, expect, it } from 'vitest';
import { csvText } from '#shared/text/csv.ts';

describe('a CSV text', () => {
  it('runs nothing in a spreadsheet, and leaves numbers as they are', () => {
    const cells = ['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '＝1', -1.5, 'plain'];
    expect(csvText([cells])).toBe("'=1+1,'+1,'-1,'@SUM(A1),'\t=1,'＝1,-1.5,plain\r\n");
  });

  it('with a decimal comma parts its cells by semicolons', () => {
    expect(csvText([['a;b', 'c,d', 1.25, -0.5, null, 1e-7]], ',')).toBe('"a;b";c,d;1,25;-0,5;;1e-7\r\n');
  });

  it('with a decimal point parts them by commas', () => {
    expect(csvText([['a;b', 'c,d', 1.25]])).toBe('a;b,"c,d",1.25\r\n');
  });

  it('is as safe with a decimal comma', () => {
    expect(csvText([['=cmd()', 'say "x"']], ',')).toBe(`'=cmd();"say ""x"""\r\n`);
  });
});
