import { useSearchParams } from 'react-router-dom';

/** Filters and order live in the address, so a view can be shared. Empty values leave it; a change starts at page one. */
export function useUrlState<Names extends string>(): [
  Partial<Record<Names, string>>,
  (change: Partial<Record<Names, string | undefined>>) => void,
] {
  const [search, setSearch] = useSearchParams();
  const state = Object.fromEntries(search) as Partial<Record<Names, string>>;
  const change = (values: Partial<Record<Names, string | undefined>>) =>
    setSearch((before) => {
      const after = new URLSearchParams(before);
      if (!('cursor' in values)) after.delete('cursor');
      for (const [name, value] of Object.entries<string | undefined>(values)) {
        if (value) after.set(name, value);
        else after.delete(name);
      }
      return after;
    });
  return [state, change];
}
