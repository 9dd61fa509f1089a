import type { FitsFile, Header } from './fits/model.ts';

/** Text of a card, trimmed; empty when absent or not a text. */
export function cardText(header: Header, keyword: string): string {
  const value = header.get(keyword);
  return typeof value === 'string' ? value.trim() : '';
}

/** Number of a card; null when absent, not a number or not finite. Numbers written as text count. */
export function cardNumber(header: Header, keyword: string): number | null {
  const value = header.get(keyword);
  if (typeof value === 'string' && value.trim() !== '' && Number.isFinite(Number(value)))
    return Number(value);
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}

/** The headers that speak of an HDU, nearest first: its own, then the primary one. */
export function headersFor(file: FitsFile, hdu: number): readonly Header[] {
  const own = file.hdus.find(({ index }) => index === hdu);
  const primary = file.hdus.find(({ index }) => index === 0);
  return [own, primary].filter((h, i, all) => h !== undefined && all.indexOf(h) === i).map((h) => h!.header);
}
