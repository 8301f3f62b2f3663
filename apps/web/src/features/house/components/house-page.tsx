import type { House, PersonRow } from '@foldwell/contracts';
import { useQuery } from '@tanstack/react-query';

import { Loaded } from '../../../components/loading';
import { NarrowNotice } from '../../../components/narrow-notice';
import { api } from '../../../lib/api-client';
import { People } from './people';
import { Places } from './places';
import { Rates } from './rates';
import { Series } from './series';
import { Settings } from './settings';

/** The house: people, drawers and who may carry goods, step and tolerances, currencies, terms, number series. */
export function HousePage() {
  const house = useQuery({ queryKey: ['house'], queryFn: () => api<House>('/house') });
  const people = useQuery({ queryKey: ['people'], queryFn: () => api<PersonRow[]>('/people') });
  return (
    <Loaded query={house} says="Opening the house.">
      {(found) => (
        <>
          <div className="head">
            <h1>House</h1>
            <span className="soft">
              {found.name}, {found.town}. {found.baseCurrency}, {found.zone}, balance reads to{' '}
              {found.step === 10 ? '0.01' : '0.001'} ct
            </span>
          </div>
          <NarrowNotice what="The house’s settings" />
          <div className="grid xl:grid-cols-[minmax(0,1.3fr)_minmax(0,0.8fr)_minmax(0,1.2fr)] border-t border-crease-2 flex-1">
            <div className="min-w-0">
              <Places people={people.data ?? []} />
              <Series house={found} />
            </div>
            <Settings house={found} />
            <div className="min-w-0 border-l border-crease-2">
              <People people={people.data ?? []} />
              <Rates house={found} />
            </div>
          </div>
        </>
      )}
    </Loaded>
  );
}
