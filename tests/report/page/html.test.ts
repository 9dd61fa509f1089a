import { describe, expect, it } from 'vitest';
import { html, jsonBlock, outside } from '../../../report/page/html.ts';
import { percent, whole } from '../../../report/page/numbers.ts';
import { ticks } from '../../../report/page/ticks.ts';

describe('html', () => {
  it('escapes every inserted text, in content and in attributes, also inside arrays', () => {
    const hostile = `<b title="x" id='y'>&`;
    const safe = '&lt;b title=&quot;x&quot; id=&#39;y&#39;&gt;&amp;';
    expect(html`<p title="${hostile}">${[hostile, [hostile]]}</p>`.text).toBe(
      `<p title="${safe}">${safe}${safe}</p>`,
    );
  });

  it('does not escape markup twice, and null is nothing', () => {
    expect(html`<p>${html`<i>${'&'}</i>`}${null}</p>`.text).toBe('<p><i>&amp;</i></p>');
  });

  it('replaces characters HTML forbids and keeps line breaks and astral characters', () => {
    expect(html`${'a\u0000b\u009fc\ud800d\ufffee'}`.text).toBe('a\ufffdb\ufffdc\ufffdd\ufffde');
    expect(html`${'a\n\t😀'}`.text).toBe('a\n\t😀');
  });
});

describe('outside()', () => {
  it('isolates the direction of the text and cuts what is absurdly long', () => {
    expect(outside('\u202eabc').text).toBe('<bdi>\u202eabc</bdi>');
    expect(outside('😀'.repeat(10_000)).text).toBe(`<bdi>${'😀'.repeat(160)}…</bdi>`);
  });
});

describe('jsonBlock()', () => {
  it('cannot end its script element, and means the same', () => {
    const value = { name: '</script><!--<script>' };
    const { text } = jsonBlock(value);
    expect(text).not.toContain('<');
    expect(JSON.parse(text)).toEqual(value);
  });
});

describe('percent()', () => {
  it('never rounds to certainty or impossibility', () => {
    expect([0, 0.004, 0.5, 0.996, 1, null].map(percent)).toEqual([
      '0 %',
      '<1 %',
      '50 %',
      '>99 %',
      '100 %',
      '–',
    ]);
  });
});

describe('whole()', () => {
  it('parts thousands', () => {
    expect([7, 999, 1000, 1234567].map(whole)).toEqual(['7', '999', '1\u202f000', '1\u202f234\u202f567']);
  });
});

describe('ticks()', () => {
  it('stand at 1, 2 or 5 times a power of ten, inside the range', () => {
    expect(ticks(0, 1, 5)).toEqual([0, 0.2, 0.4, 0.6, 0.8, 1]);
    expect(ticks(-312, 290, 6)).toEqual([-200, 0, 200]);
    expect(ticks(3, 3, 5)).toEqual([3]);
  });
});
