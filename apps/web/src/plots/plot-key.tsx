import { type Plot, roleStyles } from '@nightcone/drawing';
import { roleColor } from './role-colors.ts';

/** What the pens mean, for those marks that cannot be labelled in place. */
export function PlotKey({ entries }: { entries: NonNullable<Plot['key']> }) {
  return (
    <ul className="flex flex-wrap gap-x-5 gap-y-1 text-ink2 text-small">
      {entries.map((entry) => (
        <li key={`${entry.role} ${entry.label}`} className="flex items-center gap-2">
          <svg width={28} height={12} aria-hidden="true" fill="none" stroke={roleColor(entry.role)}>
            {entry.mark === 'line' ? (
              <path
                d="M0,6H28"
                strokeWidth={Math.max(1.2, roleStyles[entry.role].width)}
                strokeDasharray={roleStyles[entry.role].dash ?? undefined}
              />
            ) : entry.mark === 'cross' ? (
              <path d="M10,2L18,10M10,10L18,2" strokeWidth={1.3} />
            ) : (
              <circle cx={14} cy={6} r={2} fill={roleColor(entry.role)} stroke="none" />
            )}
          </svg>
          {entry.label}
        </li>
      ))}
    </ul>
  );
}
