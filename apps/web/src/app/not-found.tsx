import { ButtonLink } from '../components/button.tsx';
import { Page } from '../components/page.tsx';

export function Component() {
  return (
    <Page wide title="No page here">
      <p className="my-4 max-w-[60ch] text-ink2">
        The address names no page. A hash from a paper goes into the look-up field at the top.
      </p>
      <ButtonLink to="/">Back to Tonight</ButtonLink>
    </Page>
  );
}
