import { Dialog as Radix } from 'radix-ui';
import type { ReactNode } from 'react';

/** A modal sheet: focus is held inside and given back; Escape closes. */
export function Dialog({
  open,
  onOpenChange,
  title,
  description,
  children,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: ReactNode;
  description?: ReactNode;
  children: ReactNode;
}) {
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-40 bg-ink/35 night:bg-[oklch(10%_0.02_275/0.7)]" />
        <Radix.Content
          {...(description ? {} : { 'aria-describedby': undefined })}
          onOpenAutoFocus={(event) => {
            // A dialog that asks for something starts there, not at its Close.
            const field = (event.currentTarget as HTMLElement).querySelector<HTMLElement>('input, select, textarea');
            if (!field) return;
            event.preventDefault();
            field.focus();
          }}
          className="fixed top-[12vh] left-1/2 z-50 max-h-[80vh] w-[min(36rem,calc(100vw-2rem))] -translate-x-1/2 overflow-auto border border-ink bg-ground p-5 outline-none"
        >
          <div className="mb-3 flex items-baseline justify-between gap-4">
            <Radix.Title className="font-semibold font-serif text-h2">{title}</Radix.Title>
            <Radix.Close className="link min-h-6 cursor-pointer text-small">Close</Radix.Close>
          </div>
          {description ? (
            <Radix.Description className="mb-3 text-ink2 text-small">{description}</Radix.Description>
          ) : null}
          {children}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
