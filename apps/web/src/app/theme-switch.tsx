import { chooseTheme, type Theme, useTheme } from '../lib/theme.ts';

const themes: { value: Theme; label: string }[] = [
  { value: 'paper', label: 'Paper' },
  { value: 'night', label: 'Night' },
];

export function ThemeSwitch() {
  const now = useTheme();
  return (
    // biome-ignore lint/a11y/useSemanticElements: two words in a line of the header, no form
    <div role="group" aria-label="Look" className="flex items-center gap-1.5 text-small">
      {themes.map(({ value, label }, index) => (
        <span key={value} className="flex items-center gap-1.5">
          {index > 0 ? <span aria-hidden>/</span> : null}
          <button
            type="button"
            aria-pressed={now === value}
            onClick={() => chooseTheme(value)}
            className={`min-h-6 min-w-6 cursor-pointer ${now === value ? 'font-semibold text-ink' : 'text-ink2 hover:text-ink'}`}
          >
            {label}
          </button>
        </span>
      ))}
    </div>
  );
}
