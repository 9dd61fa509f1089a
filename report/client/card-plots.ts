import type { SpectrumPayload } from '../spectrum/payload.ts';
import { palette } from './palette.ts';
import { drawScan } from './scan-plot.ts';
import { drawSpectrum } from './spectrum-plot.ts';
import type { Drawn } from './spectrum-plot.ts';
import { unpack } from './unpack.ts';
import type { Unpacked } from './unpack.ts';

/** Plots of one card: drawn when it comes near the screen, given back when it has gone. */
export class CardPlots {
  readonly card: HTMLElement;
  private drawn: { destroy(): void } | null = null;
  private busy = false;

  constructor(card: HTMLElement) {
    this.card = card;
  }

  async show(): Promise<void> {
    if (this.drawn !== null || this.busy) return;
    const block = document.getElementById(`curves-${this.card.dataset['index'] ?? ''}`);
    const plots = this.card.querySelector<HTMLElement>('.plots');
    if (block === null || plots === null || plots.clientWidth === 0) return;
    this.busy = true;
    try {
      const spectrum = await unpack(JSON.parse(block.textContent) as SpectrumPayload);
      this.drawn = drawAll(plots, spectrum, this.card.querySelector('h3')?.textContent ?? '');
    } finally {
      this.busy = false;
    }
  }

  hide(): void {
    this.drawn?.destroy();
    this.drawn = null;
  }
}

function drawAll(plots: HTMLElement, spectrum: Unpacked, name: string): { destroy(): void } {
  const colours = palette();
  // The height stays while the plots are away, so that the page does not jump under the reader.
  plots.replaceChildren();
  const tools = document.createElement('div');
  tools.className = 'plot-tools';
  const main = picture(`Spectrum of ${name}: data with error band, best model, residuals below.`);
  const scan = picture(`Chi-square against redshift of ${name}, candidates numbered.`);
  const scanTools = document.createElement('div');
  scanTools.className = 'plot-tools';
  plots.append(tools, main, scanTools, scan);
  const drawn: Drawn = drawSpectrum(main, spectrum, colours);
  const scanPlot = spectrum.scan.length > 0 ? drawScan(scan, spectrum, colours) : null;
  const hasRunnerUp = spectrum.arms.some((arm) => arm.runnerUp !== null);
  tools.append(key('key-data', 'data'), key('key-best', 'best model'), key('key-band', '± error'));
  if (hasRunnerUp) tools.append(toggle('runner-up', 'key-runner-up', false, (on) => drawn.showRunnerUp(on)));
  tools.append(
    toggle('lines', 'key-lines', true, (on) => drawn.showMarks(on)),
    key('key-mask', 'not used'),
  );
  scanTools.append(
    'Search, by kind:',
    ...spectrum.scan.map(({ kind }) => key(`key-${kind}`, kind)),
    'numbers: candidates',
  );
  if (scanPlot === null) scanTools.replaceChildren();
  const hint = document.createElement('span');
  hint.className = 'hint';
  hint.textContent = 'drag to zoom, double-click to go back';
  tools.append(hint);
  return {
    destroy: () => {
      plots.style.minHeight = `${plots.offsetHeight}px`;
      drawn.destroy();
      scanPlot?.destroy();
      plots.replaceChildren();
    },
  };
}

function picture(description: string): HTMLElement {
  const element = document.createElement('div');
  element.setAttribute('role', 'img');
  element.setAttribute('aria-label', description);
  return element;
}

function key(swatch: string, label: string): HTMLElement {
  const element = document.createElement('span');
  element.className = `key ${swatch}`;
  element.textContent = label;
  return element;
}

function toggle(label: string, swatch: string, on: boolean, change: (on: boolean) => void): HTMLElement {
  const element = document.createElement('label');
  element.className = `key ${swatch}`;
  const box = document.createElement('input');
  box.type = 'checkbox';
  box.checked = on;
  box.addEventListener('change', () => change(box.checked));
  element.append(box, ` ${label}`);
  return element;
}
