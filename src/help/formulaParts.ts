export interface FormulaPart {
  place: 'line' | 'sub' | 'sup';
  text: string;
}

const pattern = /([_^])\{([^{}]*)\}/g;

/** Takes a formula apart: `f_{s}` lowers what stands in braces, `10^{x}` raises it; everything else stays on the line. */
export function formulaParts(formula: string): FormulaPart[] {
  const parts: FormulaPart[] = [];
  let from = 0;
  for (const match of formula.matchAll(pattern)) {
    if (match.index > from) parts.push({ place: 'line', text: formula.slice(from, match.index) });
    parts.push({ place: match[1] === '_' ? 'sub' : 'sup', text: match[2] ?? '' });
    from = match.index + match[0].length;
  }
  if (from < formula.length) parts.push({ place: 'line', text: formula.slice(from) });
  return parts;
}
