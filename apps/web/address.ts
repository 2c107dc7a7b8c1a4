import { useSyncExternalStore } from 'react';

/** The stations, left to right. */
export const STATIONS = ['record', 'supply', 'need', 'bank', 'network', 'money', 'proposal'] as const;
export type Station = (typeof STATIONS)[number];

/** Where the reader is: what stands behind the # of the address. */
export type Address =
  | { page: 'sites' }
  | { page: 'papers' }
  | { page: 'site'; siteId: string; station: Station; field: string | null; figure: string | null }
  | { page: 'survey'; siteId: string }
  | { page: 'reevaluation'; siteId: string; revision: number | null }
  | { page: 'unknown'; asked: string };

/** @param hash as the browser has it */
export function readAddress(hash: string): Address {
  const [path = '', search = ''] = hash.replace(/^#?\/?/, '').split('?');
  if (path === '') return { page: 'sites' };
  if (path === 'papers') return { page: 'papers' };
  const [first, siteId, station = 'bank', ...rest] = path.split('/');
  if (first !== 'sites' || siteId === undefined || siteId === '' || rest.length > 0)
    return { page: 'unknown', asked: path };
  if (station === 'survey') return { page: 'survey', siteId };
  if (station === 'reevaluation') return { page: 'reevaluation', siteId, revision: revisionIn(search) };
  if (!isStation(station)) return { page: 'unknown', asked: path };
  const asked = new URLSearchParams(search);
  return { page: 'site', siteId, station, field: asked.get('field'), figure: asked.get('figure') };
}

/** @param part what is to be opened */
export function siteAddress(siteId: string, station: Station, part: { field?: string; figure?: string } = {}): string {
  const search = new URLSearchParams(part as Record<string, string>).toString();
  return `#/sites/${siteId}/${station}${search === '' ? '' : `?${search}`}`;
}

/**
 * Where a site's bank is judged again.
 * @param revision held against; absent, the latest one
 */
export function reevaluationAddress(siteId: string, revision?: number): string {
  return `#/sites/${siteId}/reevaluation${revision === undefined ? '' : `?revision=${revision}`}`;
}

function revisionIn(search: string): number | null {
  const text = new URLSearchParams(search).get('revision') ?? '';
  return /^[1-9]\d{0,8}$/.test(text) ? Number(text) : null;
}

function isStation(word: string): word is Station {
  return (STATIONS as readonly string[]).includes(word);
}

/** What the site has of its devices is entered beside the table of them. */
const AT_DEVICES =
  /^(place|supply\.earthing|control\.currentTransformer|bank\.(?!stages)\w|bank\.stages\[\d+\]\.(switch|fuse|reactor(Max|Linear|Quality)|discharge|measured))/;

/** The station at which a path of the site file is entered. */
export function stationOfPath(path: string): Station {
  if (AT_DEVICES.test(path)) return 'network';
  const first = /^\w+/.exec(path)?.[0] ?? '';
  if (['target'].includes(first)) return 'need';
  if (['bank', 'control', 'catalogue'].includes(first)) return 'bank';
  if (['recordedBank', 'timeZone', 'estimate', 'recordId'].includes(first)) return 'record';
  if (['tariff', 'prices', 'finance', 'currency', 'papers'].includes(first)) return 'money';
  return 'supply';
}

/** Where what a remark without a field is about is looked at, by the first word of its code. */
export function stationOfCode(code: string): Station {
  const [first = ''] = code.split('.');
  if (['money', 'prices', 'search', 'papers'].includes(first)) return 'money';
  if (['need', 'target'].includes(first)) return 'need';
  if (['layout', 'bank', 'switchings', 'operation', 'reconnection'].includes(first)) return 'bank';
  if (['supply', 'site', 'loads', 'understood', 'measured'].includes(first)) return 'supply';
  if (['record', 'recordedBank', 'estimate'].includes(first)) return 'record';
  return 'network';
}

function subscribe(changed: () => void): () => void {
  window.addEventListener('hashchange', changed);
  return () => window.removeEventListener('hashchange', changed);
}

/** The address, followed. */
export function useAddress(): Address {
  const hash = useSyncExternalStore(subscribe, () => window.location.hash);
  return readAddress(hash);
}
