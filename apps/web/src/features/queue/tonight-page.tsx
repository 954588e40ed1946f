import { NightStrip } from '../../components/night-strip.tsx';
import { Page } from '../../components/page.tsx';

export function Component() {
  return (
    <Page title="Tonight">
      <NightStrip />
    </Page>
  );
}
