import { plainName } from './array-kind.ts';
import type { TableColumn, TableHdu } from './fits/model.ts';
import type { TargetColumns } from './layout.ts';

/** Patterns of a column's plain name, best first; a UCD beats a name. */
interface ColumnRule {
  readonly ucd: RegExp | null;
  readonly names: readonly RegExp[];
}

const RULES: Readonly<Record<keyof TargetColumns, ColumnRule>> = {
  name: {
    ucd: /^meta\.id(;meta\.main)?$/,
    names: [
      /^(target|object|obj|source|star)_?(name|id|no|number)$/,
      /^(target|object|source|star|name|id)$/,
      /^(target|object|source)_?designation$|^designation$/,
    ],
  },
  ra: { ucd: /^pos\.eq\.ra/, names: [/^ra(_?(deg|j2000|icrs))?$/, /^(target|object|obj)_ra$/, /_ra$/] },
  dec: {
    ucd: /^pos\.eq\.dec/,
    names: [/^dec(l|_?(deg|j2000|icrs))?$/, /^(target|object|obj)_dec$/, /_dec$/],
  },
  fibre: {
    ucd: null,
    names: [/^(fibre|fiber)(_?(id|no|num|number))?$/, /^(slit|aperture)(_?(id|no|number))?$/],
  },
  role: {
    ucd: null,
    names: [/^role$/, /^(fibre|fiber|fib)_?(type|use|role|status)$/, /^(obj|object|target)_?type$/],
  },
  targetClass: { ucd: null, names: [/^(target|object)_?class$/, /^target_?(group|category)$/] },
  magnitude: { ucd: /^phot\.mag/, names: [/^mag(nitude)?$/, /^mag_[a-z]$/, /^[ugrizy]_?mag$/] },
  magnitudeBand: { ucd: null, names: [/^(mag(nitude)?_?)?(band|filter)$/] },
};

/**
 * Find the columns of a table that say what each row was pointed at, by UCD and by generic stems.
 *
 * @param table any table; redshifts and what others concluded are never among the columns looked for
 */
export function targetColumnsOf(table: TableHdu): TargetColumns {
  const find = (key: keyof TargetColumns): string | null => findColumn(table.columns, RULES[key]);
  return {
    name: find('name'),
    ra: find('ra'),
    dec: find('dec'),
    fibre: find('fibre'),
    role: find('role'),
    targetClass: find('targetClass'),
    magnitude: find('magnitude'),
    magnitudeBand: find('magnitudeBand'),
  };
}

/** How many of the wanted columns a table has. */
export function countFound(columns: TargetColumns): number {
  return Object.values(columns).filter((name) => name !== null).length;
}

function findColumn(columns: readonly TableColumn[], rule: ColumnRule): string | null {
  const { ucd } = rule;
  if (ucd !== null) {
    const byUcd = columns.find((column) => ucd.test(column.ucd.trim().toLowerCase()));
    if (byUcd !== undefined) return byUcd.name;
  }
  for (const pattern of rule.names) {
    const byName = columns.find((column) => pattern.test(plainName(column.name)) && isScalar(column));
    if (byName !== undefined) return byName.name;
  }
  return null;
}

/** One value per row; a character column holds one text however long. */
function isScalar(column: TableColumn): boolean {
  return column.code === 'A' || column.repeat === 1;
}
