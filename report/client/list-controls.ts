/** What the reader asked the list for; empty text = everything. */
interface Wish {
  readonly reason: string;
  readonly kind: string;
  readonly fibre: string;
  readonly text: string;
  readonly confidenceFrom: number;
  readonly confidenceTo: number;
  readonly order: string;
}

type Cards = readonly HTMLElement[];

const ORDERS: Readonly<Record<string, (a: HTMLElement, b: HTMLElement) => number>> = {
  'as written': (a, b) => number(a, 'index') - number(b, 'index'),
  'surest first': (a, b) => number(b, 'confidence') - number(a, 'confidence'),
  'least sure first': (a, b) => number(a, 'confidence') - number(b, 'confidence'),
  'brightest signal first': (a, b) => number(b, 'snr') - number(a, 'snr'),
  'by fibre': (a, b) => number(a, 'fibre') - number(b, 'fibre'),
  'by kind': (a, b) => text(a, 'kind').localeCompare(text(b, 'kind'), 'en'),
  'by reason': (a, b) => text(a, 'reasons').localeCompare(text(b, 'reasons'), 'en'),
  'by target name': (a, b) => text(a, 'name').localeCompare(text(b, 'name'), 'en', { numeric: true }),
};

/**
 * Builds the controls above the list.
 *
 * @param changed called after the list was filtered, sorted or folded
 * @param keep draws all shown plots and keeps them, or goes back to those near the screen
 */
export function addControls(
  into: HTMLElement,
  list: HTMLElement,
  cards: Cards,
  changed: () => void,
  keep: (all: boolean) => Promise<void>,
): void {
  const form = document.createElement('form');
  form.addEventListener('submit', (event) => event.preventDefault());
  const reasons = distinct(cards.flatMap((card) => text(card, 'reasons').split(' ')));
  const reason = select('reason', ['any', ...reasons]);
  const kind = select('kind', ['any', ...distinct(cards.map((card) => text(card, 'kind')))]);
  const fibre = input('fibre', 'text', 'any');
  fibre.field.inputMode = 'numeric';
  const from = input('confidence from, %', 'number', '0');
  const to = input('to, %', 'number', '100');
  for (const { field } of [from, to]) Object.assign(field, { min: '0', max: '100' });
  const search = input('name or id contains', 'search', '');
  const order = select('order', Object.keys(ORDERS));
  const folded = checkbox('list only');
  // A page is printed as it is drawn: without this only the plots near the screen would be on paper.
  const paper = checkbox('draw all plots, for paper');
  const told = document.createElement('p');
  told.setAttribute('role', 'status');
  form.append(...[reason, kind, fibre, from, to, search, order, folded, paper].map(({ label }) => label));
  into.append(form, told);

  const update = (): void => {
    const wish: Wish = {
      reason: reason.field.value,
      kind: kind.field.value,
      fibre: fibre.field.value.trim(),
      text: search.field.value.trim().toLowerCase(),
      confidenceFrom: Number(from.field.value || '0') / 100,
      confidenceTo: Number(to.field.value || '100') / 100,
      order: order.field.value,
    };
    const shown = cards.filter((card) => wanted(card, wish));
    const hidden = new Set(cards);
    for (const card of shown) hidden.delete(card);
    for (const card of cards) card.hidden = hidden.has(card);
    // Array sort is stable: equal keys keep the order the report was written in.
    list.replaceChildren(...cards.toSorted(ORDERS[wish.order]!));
    list.classList.toggle('folded', folded.field.checked);
    told.textContent = `${shown.length} of ${cards.length} shown`;
    changed();
  };
  form.addEventListener('input', (event) => {
    if (event.target !== paper.field) update();
  });
  paper.field.addEventListener('change', () => {
    paper.field.disabled = true;
    void keep(paper.field.checked).finally(() => {
      paper.field.disabled = false;
    });
  });
  update();
}

function wanted(card: HTMLElement, wish: Wish): boolean {
  if (wish.reason !== 'any' && !text(card, 'reasons').split(' ').includes(wish.reason)) return false;
  if (wish.kind !== 'any' && text(card, 'kind') !== wish.kind) return false;
  if (wish.fibre !== '' && text(card, 'fibre') !== wish.fibre) return false;
  const confidence = text(card, 'confidence') === '' ? 0 : number(card, 'confidence');
  if (confidence < wish.confidenceFrom || confidence > wish.confidenceTo) return false;
  return wish.text === '' || `${text(card, 'name')} ${text(card, 'id')}`.toLowerCase().includes(wish.text);
}

function text(card: HTMLElement, name: string): string {
  return card.dataset[name] ?? '';
}

/** Missing numbers sort last in rising order. */
function number(card: HTMLElement, name: string): number {
  const written = text(card, name);
  return written === '' ? Number.MAX_VALUE : Number(written);
}

function distinct(words: readonly string[]): string[] {
  return [...new Set(words.filter((word) => word !== ''))].sort();
}

function labelled<T extends HTMLElement>(name: string, field: T): { label: HTMLLabelElement; field: T } {
  const label = document.createElement('label');
  const caption = document.createElement('span');
  caption.textContent = name;
  // Else the options of a select would be part of its name.
  field.setAttribute('aria-label', name);
  label.append(caption, field);
  return { label, field };
}

function select(
  name: string,
  options: readonly string[],
): { label: HTMLLabelElement; field: HTMLSelectElement } {
  const field = document.createElement('select');
  field.append(...options.map((option) => new Option(option, option)));
  return labelled(name, field);
}

function input(
  name: string,
  type: string,
  hint: string,
): { label: HTMLLabelElement; field: HTMLInputElement } {
  const field = document.createElement('input');
  field.type = type;
  field.placeholder = hint;
  return labelled(name, field);
}

function checkbox(name: string): { label: HTMLLabelElement; field: HTMLInputElement } {
  const label = document.createElement('label');
  label.className = 'box';
  const field = document.createElement('input');
  field.type = 'checkbox';
  label.append(field, ` ${name}`);
  return { label, field };
}
