import { CardPlots } from './card-plots.ts';
import { addControls } from './list-controls.ts';

/** Plots are drawn this far before they scroll into view, so that nobody waits for one. */
const AHEAD = '900px';

const list = document.getElementById('cards');
const controls = document.getElementById('controls');
if (list !== null && controls !== null) {
  const cards = Array.from(list.querySelectorAll<HTMLElement>('.card'));
  const plots = new Map(cards.map((card) => [card, new CardPlots(card)]));
  let keepAll = false;
  const watch = new IntersectionObserver(
    (entries) => {
      for (const { target, isIntersecting } of entries) {
        const one = plots.get(target as HTMLElement);
        if (isIntersecting) void one?.show();
        else if (!keepAll) one?.hide();
      }
    },
    { rootMargin: AHEAD },
  );
  const watchAll = (): void => {
    // Watching anew reports every card once, also those that a filter or fold moved without scrolling.
    watch.disconnect();
    for (const card of cards) watch.observe(card);
  };
  const keep = async (all: boolean): Promise<void> => {
    keepAll = all;
    if (all) for (const [card, one] of plots) if (!card.hidden) await one.show();
    watchAll();
  };
  addControls(controls, list, cards, watchAll, keep);

  const redraw = (): void => {
    for (const one of plots.values()) one.hide();
    watchAll();
  };
  let pending = 0;
  addEventListener('resize', () => {
    clearTimeout(pending);
    pending = setTimeout(redraw, 200);
  });
  matchMedia('(prefers-color-scheme: dark)').addEventListener('change', redraw);
}
