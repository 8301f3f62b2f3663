import type { MemoDetail } from '@foldwell/contracts';
import { shortDate } from '@foldwell/quantities';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { api } from '../../../lib/api-client';

/** What we said and they said; theirs stands out. */
export function MemoWords({ memo }: { memo: MemoDetail }) {
  const [words, setWords] = useState('');
  const [isTheirs, setTheirs] = useState(false);
  const client = useQueryClient();
  const keep = async () => {
    if (words.trim() === '') return;
    await api(`/memos/${memo.number}/words`, { method: 'POST', body: { words, isTheirs } });
    setWords('');
    await client.invalidateQueries({ queryKey: ['memo', memo.number] });
  };
  return (
    <div className="min-w-0">
      <div className="section-head">
        <h2>Words with {memo.party}</h2>
      </div>
      <table>
        <caption>Words</caption>
        <tbody>
          {memo.words.map((one) => (
            <tr key={one.at + one.words}>
              <td className="soft">{shortDate(one.at.slice(0, 10))}</td>
              <td className={`whitespace-normal ${one.isTheirs ? 'font-semibold' : ''}`}>
                {one.words}
              </td>
              <td className="quiet">{one.by}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="flex gap-2 px-6 py-3 items-center">
        <input
          aria-label="Write down a call"
          placeholder="Write down a call"
          className="border border-edge bg-paper px-2 h-[30px] grow min-w-0"
          value={words}
          onChange={(event) => setWords(event.target.value)}
          onKeyDown={(event) => {
            if (event.key === 'Enter') void keep();
          }}
        />
        <label className="check small">
          <input
            type="checkbox"
            checked={isTheirs}
            onChange={(event) => setTheirs(event.target.checked)}
          />
          theirs
        </label>
        <button type="button" className="btn" onClick={() => void keep()}>
          Keep note
        </button>
      </div>
    </div>
  );
}
