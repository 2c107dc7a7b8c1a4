import type { Bank } from '../layout/bank.js';
import type { Recommended } from '../money/money-result.js';
import type { Control } from '../operation/control.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type MoneyStudy, siteSwitchKind } from './money-study.js';
import type { Site } from './site.js';

/** A way that was weighed by its money, with what it takes to weigh it again. */
export interface WeighedBank {
  name: Recommended;
  /** without stages where nothing is built or kept */
  bank: Bank;
  control: Control;
  switchKind: string | null;
  /** it has yet to be paid */
  isNew: boolean;
  /** may it be recommended at all: target and verdict allow it */
  eligible: boolean;
}

/** What was weighed by its money. */
export interface WaysWeighed {
  site: Site;
  /** in the order of preference among equals */
  ways: WeighedBank[];
  /** name of the way the outcome tells of */
  chosen: Recommended;
}

/** The same with the record it was weighed on. */
export interface PricedWays extends WaysWeighed {
  record: LoadRecord;
  zone: ZoneTable;
}

/**
 * The one way of a bank that was not searched for: it is priced as new.
 * @param site validated site
 * @param money the site's money without a bank, null without a tariff
 * @param built bank and control; null where none is built
 * @returns the way, or undefined where nothing is priced
 */
export function onlyWay(
  site: Site,
  money: MoneyStudy | null,
  built: { bank: Bank; control: Control } | null,
): WaysWeighed | undefined {
  if (money === null || built === null || built.bank.groups.length === 0) return undefined;
  const way: WeighedBank = {
    name: 'new bank',
    ...built,
    switchKind: siteSwitchKind(site),
    isNew: true,
    eligible: true,
  };
  return { site, ways: [way], chosen: way.name };
}
