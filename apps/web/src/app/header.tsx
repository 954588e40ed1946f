import type { Account } from '@nightcone/contracts';
import { useEffect, useState } from 'react';
import { Link, NavLink, useLocation } from 'react-router-dom';
import { TextButton } from '../components/button.tsx';
import { LookupField } from './lookup-field.tsx';
import { ThemeSwitch } from './theme-switch.tsx';

const pages = [
  { to: '/', label: 'Tonight' },
  { to: '/question', label: 'New question' },
  { to: '/jobs', label: 'Jobs' },
  { to: '/sweeps', label: 'Sweeps' },
  { to: '/methods', label: 'Methods' },
];
const adminPages = [{ to: '/admin/people', label: 'Admin' }];

/** Wordmark, pages, look-up, theme, account. On a narrow screen the pages fold into one menu. */
export function Header({ account }: { account: Account | null }) {
  const { pathname } = useLocation();
  const [open, setOpen] = useState(false);
  // biome-ignore lint/correctness/useExhaustiveDependencies: a change of page closes the menu
  useEffect(() => setOpen(false), [pathname]);
  const links = account
    ? [...pages, ...(account.role === 'admin' ? adminPages : [])]
    : pages.filter((page) => page.to === '/methods');
  return (
    <header className="flex min-h-[52px] flex-wrap items-center gap-x-7 gap-y-1 py-1.5">
      <Link to="/" className="py-1 font-semibold font-serif text-h2">
        Nightcone
      </Link>
      <TextButton
        className="ml-auto min-h-9 margin:hidden"
        aria-expanded={open}
        aria-controls="pages"
        onClick={() => setOpen(!open)}
      >
        Menu
      </TextButton>
      <nav
        id="pages"
        aria-label="Pages"
        className={`${open ? 'flex' : 'hidden'} w-full flex-col gap-x-5 margin:flex margin:w-auto margin:flex-row`}
      >
        {links.map((page) => (
          <NavLink
            key={page.to}
            to={page.to}
            end={page.to === '/'}
            className={({ isActive }) =>
              `border-b-2 py-2 ${isActive ? 'border-ink font-semibold' : 'border-transparent text-ink2 hover:border-rule'}`
            }
          >
            {page.label}
          </NavLink>
        ))}
      </nav>
      <div
        className={`${open ? 'flex' : 'hidden'} w-full flex-wrap items-center gap-x-6 gap-y-2 margin:ml-auto margin:flex margin:w-auto`}
      >
        {account ? <LookupField /> : null}
        <ThemeSwitch />
        {account ? (
          <NavLink to="/account" className="py-2 text-small" title={account.name}>
            you
          </NavLink>
        ) : null}
      </div>
    </header>
  );
}
