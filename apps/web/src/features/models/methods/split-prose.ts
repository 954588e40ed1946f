export type ProsePart = { kind: 'text' | 'inline' | 'display'; text: string };

/** Paragraphs of prose with formulas between $…$ (inline) and $$…$$ (set apart). A lone $ stays a dollar sign. */
export function splitProse(prose: string): ProsePart[][] {
  return prose
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter(Boolean)
    .map((paragraph) => {
      const parts: ProsePart[] = [];
      let at = 0;
      for (const match of paragraph.matchAll(/\$\$([\s\S]+?)\$\$|\$([^$\n]+?)\$/g)) {
        if (match.index > at) parts.push({ kind: 'text', text: paragraph.slice(at, match.index) });
        parts.push(
          match[1] === undefined
            ? { kind: 'inline', text: match[2] ?? '' }
            : { kind: 'display', text: match[1].trim() },
        );
        at = match.index + match[0].length;
      }
      if (at < paragraph.length) parts.push({ kind: 'text', text: paragraph.slice(at) });
      return parts;
    });
}
