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
    const element = ref.current;
    if (!element) return;
    let current = true;
    // what is wider than its place scrolls, and what scrolls must be reachable by keys
    const measure = () => {
      if (display && element.scrollWidth > element.clientWidth) element.tabIndex = 0;
      else element.removeAttribute('tabindex');
    };
    load().then(
      (katex) => {
        if (!current) return;
        katex.render(tex, element, { displayMode: display, throwOnError: false });
        measure();
      },
      () => undefined,
    );
    addEventListener('resize', measure);
    return () => {
      current = false;
      removeEventListener('resize', measure);
    };
  }, [tex, display]);
  return (
    <span
      ref={ref}
      className={`[&_.katex]:text-[1.04em] ${display ? 'my-2 block overflow-x-auto overflow-y-hidden py-1' : ''}`}
    >
      {tex}
    </span>
  );
}
