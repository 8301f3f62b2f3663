import { api } from '../../../lib/api-client';

/** The retailer's side, before it opens. */
export function CounterPage() {
  return (
    <main className="min-h-full grid place-items-center p-4">
      <div className="paper w-full max-w-[430px] p-8 grid gap-4">
        <h1>The counter</h1>
        <p>The counter is not open yet. Your memos, what you keep and your papers will be here.</p>
        <p className="soft">
          Until then the house that sent you the goods answers by telephone or e-mail.
        </p>
        <button
          type="button"
          className="btn justify-self-start"
          onClick={() =>
            void api('/sign-out', { method: 'POST' }).finally(() => location.assign('/sign-in'))
          }
        >
          Sign out
        </button>
      </div>
    </main>
  );
}
