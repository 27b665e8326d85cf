import { useMemo } from 'react';
import { formulaToMathMl } from '../../../shared/engine/formula/to-markup.ts';
import { Symbol_ } from '../../ui/Symbol.tsx';

/** A formula typeset as MathML, which screen readers can speak. The markup is made by our own formula reader. */
export function Formula({ result, text }: { readonly result: string; readonly text: string }) {
  const markup = useMemo(() => formulaToMathMl(text), [text]);
  return (
    <div className="flex items-center gap-2 relative overflow-x-auto border border-rule bg-surface px-3 py-2 text-lg">
      <Symbol_ symbol={result} /> =
      {/* biome-ignore lint/security/noDangerouslySetInnerHtml: built from a parsed formula of whitelisted nodes, never from raw text */}
      <span dangerouslySetInnerHTML={{ __html: markup }} />
    </div>
  );
}
