import type { ReactNode } from 'react';
import { NavLink } from 'react-router-dom';
import { useSession } from '../lib/session.ts';
import { Page } from './page.tsx';
import { Note } from './problem-note.tsx';

const pages = [
  { to: '/admin/people', label: 'People' },
  { to: '/admin/workers', label: 'Workers' },
  { to: '/admin/kernels', label: 'Programs' },
];

/** Pages for admins share their tabs and their refusal. The server decides; this only says it in words. */
export function AdminPage({ title, lead, children }: { title: string; lead?: ReactNode; children: ReactNode }) {
  const { account } = useSession();
  if (account?.role !== 'admin') {
    return (
      <Page wide title={title}>
        <Note role="alert" title="Only for admins">
          <p>This page shares out the group’s machines and people. Your role is {account?.role ?? 'none'}.</p>
        </Note>
      </Page>
    );
  }
  return (
    <Page wide title={title} lead={lead}>
      <nav aria-label="Admin" className="mt-3 flex gap-6 border-hair border-b text-small">
        {pages.map((page) => (
          <NavLink
            key={page.to}
            to={page.to}
            className={({ isActive }) =>
              `-mb-px border-b-2 py-1.5 ${isActive ? 'border-ink font-semibold' : 'border-transparent text-ink2'}`
            }
          >
            {page.label}
          </NavLink>
        ))}
      </nav>
      {children}
    </Page>
  );
}
