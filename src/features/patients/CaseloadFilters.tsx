import { Search } from 'lucide-react';
import { useId } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { classNames } from '#src/components/class-names.ts';
import { fieldClass } from '#src/components/Field.tsx';
import type { PatientFilter } from './queries.ts';

const filterWords: Record<PatientFilter, string> = {
  all: 'All',
  mine: 'Mine',
  'never-started': 'Never started',
  paused: 'Paused',
  discharged: 'Discharged',
};

const filters = Object.keys(filterWords) as PatientFilter[];

/** What the address says is to be shown; an address with an unknown filter shows everybody. */
export function useCaseloadFilter(): PatientFilter {
  const [params] = useSearchParams();
  return filters.find((name) => name === params.get('show')) ?? 'all';
}

const placeOf = (filter: PatientFilter): string => (filter === 'all' ? '?' : `?show=${filter}`);

type Props = {
  /** People on a care team have patients of their own. */
  withMine: boolean;
  neverStarted: number | undefined;
  search: string;
  onSearch: (search: string) => void;
};

export function CaseloadFilters({ withMine, neverStarted, search, onSearch }: Props) {
  const filter = useCaseloadFilter();
  return (
    <div className="flex flex-wrap items-center gap-x-6 gap-y-3">
      <SearchBox search={search} onSearch={onSearch} />
      <nav aria-label="Which patients">
        <ul className="flex flex-wrap gap-1">
          {filters
            .filter((name) => withMine || name !== 'mine')
            .map((name) => (
              <li key={name}>
                <Link
                  to={placeOf(name)}
                  replace
                  aria-current={name === filter ? 'page' : undefined}
                  className={classNames(
                    'inline-flex min-h-target items-center rounded px-3 py-1.5 font-bold',
                    name === filter
                      ? 'bg-leaf-wash text-leaf-deep'
                      : 'text-ink-soft hover:bg-bark-wash hover:text-ink',
                  )}
                >
                  {filterWords[name]}
                  {name === 'never-started' && neverStarted ? ` (${neverStarted})` : null}
                </Link>
              </li>
            ))}
        </ul>
      </nav>
    </div>
  );
}

function SearchBox({ search, onSearch }: Pick<Props, 'search' | 'onSearch'>) {
  const id = useId();
  return (
    <div className="relative min-w-0 grow basis-56 sm:max-w-80">
      <label htmlFor={id} className="sr-only">
        Name or chart number
      </label>
      <Search
        className="pointer-events-none absolute top-1/2 left-3 size-5 -translate-y-1/2 text-ink-soft"
        aria-hidden
      />
      <input
        id={id}
        type="search"
        value={search}
        maxLength={60}
        onChange={({ target }) => onSearch(target.value)}
        placeholder="Name or chart number"
        autoComplete="off"
        className={`${fieldClass} pl-10`}
      />
    </div>
  );
}
