import { useState, type ReactNode } from "react";

interface DisclosureProps {
  title: string;
  children: ReactNode;
  /** Told when it is first opened, so that what is behind it can be read then. */
  onOpen?: () => void;
}

/** Something to do or to read, closed until asked for. What was typed inside stays while it is closed. */
export function Disclosure({ title, children, onOpen }: DisclosureProps) {
  const [wasOpened, setWasOpened] = useState(false);
  return (
    <details
      className="disclosure no-print border border-hair"
      onToggle={(event) => {
        if (!event.currentTarget.open || wasOpened) return;
        setWasOpened(true);
        onOpen?.();
      }}
    >
      <summary className="cursor-pointer px-3 py-2 hover:bg-well">{title}</summary>
      <div className="border-t border-hair p-3">{wasOpened && children}</div>
    </details>
  );
}
