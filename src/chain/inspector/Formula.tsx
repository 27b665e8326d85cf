import { useMemo } from 'react';
import { formulaToMathMl } from '../../../shared/engine/formula/to-markup.ts';

/** A formula typeset as MathML, which screen readers can speak. The markup is made by our own formula reader. */
export function Formula({ text }: { readonly text: string }) {
  const markup = useMemo(() => formulaToMathMl(text), [text]);
  return (
    <div
      className="overflow-x-auto border border-rule bg-surface px-3 py-2 text-lg"
      // biome-ignore lint/security/noDangerouslySetInnerHtml: built from a parsed formula of whitelisted nodes, never from raw text
      dangerouslySetInnerHTML={{ __html: markup }}
    />
  );
}
