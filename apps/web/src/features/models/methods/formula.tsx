import { useEffect, useRef } from 'react';

type Katex = typeof import('katex').default;
let loading: Promise<Katex> | null = null;
const load = () => {
  loading ??= Promise.all([import('katex'), import('katex/dist/katex.min.css')]).then(([module]) => module.default);
  return loading;
};

/**
 * A formula set by KaTeX once it has arrived; until then its TeX stands there. Set through the document and not as
 * text, since the page's policy allows no style attributes in markup.
 */
export function Formula({ tex, display = false }: { tex: string; display?: boolean }) {
  const ref = useRef<HTMLSpanElement | null>(null);
  useEffect(() => {
    let current = true;
    load().then(
      (katex) => {
        if (current && ref.current) katex.render(tex, ref.current, { displayMode: display, throwOnError: false });
      },
      () => undefined,
    );
    return () => {
      current = false;
    };
  }, [tex, display]);
  return (
    <span ref={ref} className={display ? 'my-3 block overflow-x-auto overflow-y-hidden py-1' : ''}>
      {tex}
    </span>
  );
}
