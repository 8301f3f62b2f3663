import type { WeighedBack } from '@foldwell/contracts';

/** A stone disagrees by weight or number: whose it is, with the caution. */
export function WhoseStone({
  asks,
  onTell,
}: {
  asks: WeighedBack;
  onTell(decision: 'ours' | 'not ours'): void;
}) {
  return (
    <div className="note warn grid gap-2" role="alertdialog" aria-label="Whose stone is it">
      <h3 className="red">{asks.says}</h3>
      <div className="answers">
        <button type="button" onClick={() => onTell('ours')}>
          <b>Ours, weighs otherwise</b>
          <span className="soft">whole to quarantine</span>
        </button>
        <button type="button" onClick={() => onTell('not ours')}>
          <b>Not ours</b>
          <span className="soft">suspected switch; ours stays on the memo</span>
        </button>
      </div>
      <p className="tiny">
        Suspected, not proven: seal it, call a second witness, speak to insurer and counsel before
        accusing.
      </p>
    </div>
  );
}
