/** Symbols of quantities without a formula engine: a small TeX subset becomes runs of text in a serif face. */

export interface TextRun {
  text: string;
  italic: boolean;
  /** Lowered ('sub') or raised ('super') by the usual amount. */
  shift?: 'sub' | 'super';
}

const letters: Record<string, string> = {
  hbar: 'ħ',
  ell: 'l',
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  varepsilon: 'ε',
  epsilon: 'ε',
  theta: 'θ',
  vartheta: 'ϑ',
  kappa: 'κ',
  lambda: 'λ',
  mu: 'μ',
  nu: 'ν',
  pi: 'π',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  phi: 'φ',
  varphi: 'φ',
  chi: 'χ',
  psi: 'ψ',
  omega: 'ω',
  Gamma: 'Γ',
  Delta: 'Δ',
  Theta: 'Θ',
  Sigma: 'Σ',
  Phi: 'Φ',
  Psi: 'Ψ',
  Omega: 'Ω',
};
const words = new Set(['min', 'max', 'eff', 'tot']);
const upright: Record<string, string> = { pm: '±', times: '×', cdot: '·', prime: '′', partial: 'd', circ: '°' };

/** Reads `{…}` or one token at `at`; answers its inside and the place behind it. */
function argument(tex: string, at: number): [inside: string, next: number] {
  if (tex[at] === '{') {
    let depth = 1;
    let end = at + 1;
    while (end < tex.length && depth > 0) {
      if (tex[end] === '{') depth++;
      if (tex[end] === '}') depth--;
      end++;
    }
    return [tex.slice(at + 1, end - 1), end];
  }
  const command = /^\\[A-Za-z]+/.exec(tex.slice(at));
  const length = command ? command[0].length : 1;
  return [tex.slice(at, at + length), at + length];
}

function push(runs: TextRun[], text: string, italic: boolean, shift: TextRun['shift']) {
  const last = runs.at(-1);
  if (last && last.italic === italic && last.shift === shift) last.text += text;
  else runs.push(shift ? { text, italic, shift } : { text, italic });
}

function read(tex: string, shift: TextRun['shift'], roman: boolean, runs: TextRun[]) {
  let at = 0;
  while (at < tex.length) {
    const c = tex[at] as string;
    if (c === '_' || c === '^') {
      const [inside, next] = argument(tex, at + 1);
      read(inside, c === '_' ? 'sub' : 'super', roman, runs);
      at = next;
    } else if (c === '\\') {
      const name = /^[A-Za-z]+/.exec(tex.slice(at + 1))?.[0] ?? '';
      at += 1 + Math.max(1, name.length);
      if (['mathcal', 'mathrm', 'text', 'mathbf', 'operatorname', 'sqrt'].includes(name)) {
        const [inside, next] = argument(tex, at);
        if (name === 'sqrt') push(runs, '√', false, shift);
        read(inside, shift, roman || name === 'mathrm' || name === 'text' || name === 'operatorname', runs);
        at = next;
      } else if (letters[name]) push(runs, letters[name], !roman && name !== 'Delta', shift);
      else if (upright[name]) push(runs, upright[name], false, shift);
      else if (words.has(name)) push(runs, name, false, shift);
      else if (name === '') push(runs, ' ', false, shift);
      // a space ends a command and stands for nothing
      while (tex[at] === ' ' && name !== '') at++;
    } else if (c === '{' || c === '}') at++;
    else {
      push(runs, c === "'" ? '′' : c, !roman && /[A-Za-z]/.test(c), shift);
      at++;
    }
  }
}

/** Runs of a symbol such as `E_{\min}`, `\hbar v`, `\gamma_1`, `v_3/v`. Unknown commands are left out. */
export function symbolRuns(tex: string): TextRun[] {
  const runs: TextRun[] = [];
  read(tex, undefined, false, runs);
  return runs;
}

/** The same as plain text, for names read aloud and for tables. */
export const symbolText = (tex: string): string =>
  symbolRuns(tex)
    .map((run) => run.text)
    .join('');
