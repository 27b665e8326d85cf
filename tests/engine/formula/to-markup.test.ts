import { describe, expect, it } from 'vitest';
import { formulaToMathMl } from '../../../shared/engine/formula/to-markup.ts';
import { methods } from '../../../shared/engine/methods/catalogue.ts';

/** The markup without the element around it. */
function inner(text: string): string {
  return formulaToMathMl(text)
    .replace('<math xmlns="http://www.w3.org/1998/Math/MathML"><mrow>', '')
    .replace('</mrow></math>', '');
}

describe('a formula is typeset', () => {
  it.each([
    ['a / b', '<mfrac><mrow><mi>a</mi></mrow><mrow><mi>b</mi></mrow></mfrac>'],
    ['sqrt(x)', '<msqrt><mi>x</mi></msqrt>'],
    ['rho_s', '<msub><mi>ρ</mi><mrow><mi mathvariant="normal">s</mi></mrow></msub>'],
    ['Re^0.8', '<msup><mrow><mi mathvariant="normal">Re</mi></mrow><mrow><mn>0.8</mn></mrow></msup>'],
    [
      'a - (b - c)',
      '<mrow><mi>a</mi><mo>−</mo><mrow><mo>(</mo><mrow><mi>b</mi><mo>−</mo><mi>c</mi></mrow><mo>)</mo></mrow></mrow>',
    ],
  ])('%s', (text, markup) => {
    expect(inner(text)).toBe(markup);
  });

  it('keeps the brackets that the value needs', () => {
    expect(inner('(a + b) * c')).toContain('<mo>(</mo>');
    expect(inner('(a / b)^2')).toContain('<mo>(</mo>');
    expect(inner('(-a)^2')).toContain('<mo>(</mo>');
    expect(inner('a * (-b)')).toContain('<mo>(</mo>');
    expect(inner('a * (-b * c)')).toContain('<mo>(</mo>');
    expect(inner('a - (-b)')).toContain('<mo>(</mo>');
    expect(inner('a + (-b + c)')).toContain('<mo>(</mo>');
  });

  it('keeps two numbers apart', () => {
    expect(inner('2 * 3^x')).toContain('<mo>·</mo>');
    expect(inner('a * 2')).toContain('<mo>·</mo>');
    expect(inner('1e-7 * a')).toContain('<mn>1</mn><mo>×</mo><msup><mn>10</mn><mn>−7</mn></msup>');
  });

  it.each(methods.map((method) => [method.id, method] as const))('without loss for the method %s', (_, method) => {
    const markup = formulaToMathMl(method.expression);

    expect(markup).not.toContain('<mtext>');
    for (const tag of ['mrow', 'mfrac', 'msup', 'msub', 'msqrt']) {
      expect(markup.split(`<${tag}>`).length).toBe(markup.split(`</${tag}>`).length);
    }
  });
});

describe('text that is no formula', () => {
  it.each(['<img src=x onerror=alert(1)>', 'a & b', '</math><script>x</script>', '<b> = x'])(
    '%s never becomes markup of its own',
    (text) => {
      const markup = formulaToMathMl(text);

      expect(markup).not.toMatch(/<(img|script|b)\b/);
      expect(markup).not.toMatch(/&(?!amp;|lt;|gt;|#x)/);
    },
  );
});

it.each(['constructor', 'toString', 'x_constructor', '__proto__', 'hasOwnProperty * valueOf'])(
  'the name %s, which every object has, is typeset like any other',
  (text) => {
    expect(inner(text)).toMatch(/^<m(i|sub|row)>/);
  },
);
