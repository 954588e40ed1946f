export type ProsePart = { kind: 'text' | 'strong' | 'inline' | 'display'; text: string };

/** Paragraphs of prose with **emphasis** and formulas between $…$ (inline) and $$…$$ (set apart). A lone $ is text. */
export function splitProse(prose: string): ProsePart[][] {
  return prose
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter(Boolean)
    .map((paragraph) => {
      const parts: ProsePart[] = [];
      let at = 0;
      for (const match of paragraph.matchAll(/\$\$([\s\S]+?)\$\$|\$([^$\n]+?)\$|\*\*([^*\n]+?)\*\*/g)) {
        if (match.index > at) parts.push({ kind: 'text', text: paragraph.slice(at, match.index) });
        const [, display, inline, strong = ''] = match;
        if (display !== undefined) parts.push({ kind: 'display', text: display.trim() });
        else if (inline !== undefined) parts.push({ kind: 'inline', text: inline });
        else parts.push({ kind: 'strong', text: strong });
        at = match.index + match[0].length;
      }
      if (at < paragraph.length) parts.push({ kind: 'text', text: paragraph.slice(at) });
      return parts;
    });
}
