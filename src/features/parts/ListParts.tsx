import { useState } from 'react';
import { CheckField } from '../../components/CheckField';
import { DataCell, DataRow, DataTable, RowHead, TableHead } from '../../components/DataTable';
import { FileField } from '../../components/FileField';
import { FilterLinks } from '../../components/FilterLinks';
import { HealthSign } from '../../components/HealthSign';
import { SectionHead } from '../../components/SectionHead';
import { ShowMore } from '../../components/ShowMore';
import { SortHead } from '../../components/SortHead';

const healths = [
  { health: 'calibrated', words: 'calibrated' },
  { health: 'due', words: 'due' },
  { health: 'overdue', words: 'overdue' },
  { health: 'open-question', words: 'question open' },
  { health: 'not-calibrated', words: 'not calibrated' },
  { health: 'not-seated', words: 'not seated' },
  { health: 'retired', words: 'retired' },
] as const;

/** What a long list is made of: filters and orders that live in the address, more on demand; and a file that is sent. */
export function ListParts() {
  const [shown, setShown] = useState(2);
  return (
    <section aria-labelledby="lists" className="px-5 pb-7 sm:px-10">
      <SectionHead size="small" id="lists">
        Lists and files
      </SectionHead>
      <FilterLinks
        label="filter of the parts"
        currentId="overdue"
        links={healths.map(({ health, words }, index) => ({
          id: health,
          to: '#lists',
          label: words,
          count: index,
          sign: <HealthSign health={health} />,
        }))}
      />
      <div className="mt-4 grid gap-8 lg:grid-cols-2">
        <div>
          <DataTable caption="Plates, as an example of a list">
            <TableHead>
              <tr>
                <SortHead to="#lists" sorted="asc">
                  plate
                </SortHead>
                <SortHead to="#lists" sorted={null} numeric>
                  made for, nm
                </SortHead>
              </tr>
            </TableHead>
            <tbody>
              {['H-1', 'H-2', 'Q-A', 'Q-B'].slice(0, shown).map((name) => (
                <DataRow key={name}>
                  <RowHead>{name}</RowHead>
                  <DataCell numeric>808</DataCell>
                </DataRow>
              ))}
            </tbody>
          </DataTable>
          <ShowMore what="plates" hasMore={false} isFetching={false} onMore={() => setShown(4)} />
          <ShowMore what="plates" hasMore isFetching onMore={() => setShown(4)} />
        </div>
        <div className="space-y-5">
          <CheckField label="which axis is the fast one" help="The zero may be the slow axis’s." />
          <FileField label="a file" help="At most 10 MB." accept=".csv" onFile={() => setShown(2)} />
          <FileField
            label="a file on its way"
            accept=".csv"
            onFile={() => setShown(2)}
            sending={{ name: 'scan.csv', share: 0.4 }}
            onCancel={() => setShown(2)}
          />
          <FileField
            label="a file that was refused"
            fault="x.zip is ZIP (application/zip). Send plain text such as CSV."
            accept=".csv"
            onFile={() => setShown(2)}
          />
        </div>
      </div>
    </section>
  );
}
