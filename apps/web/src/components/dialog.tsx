import { type ReactNode, useEffect, useRef } from 'react';

/** A paper with a flap that names the thing; only for what can't be answered later. Esc leaves. */
export function Dialog({
  title,
  onLeave,
  children,
}: {
  title: string;
  onLeave(): void;
  children: ReactNode;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    ref.current?.showModal();
  }, []);
  return (
    <dialog ref={ref} onClose={onLeave} aria-label={title}>
      <div className="flap">{title}</div>
      <div className="inner">{children}</div>
    </dialog>
  );
}
