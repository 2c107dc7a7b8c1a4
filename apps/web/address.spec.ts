import { describe, expect, it } from 'vitest';
import { readAddress, reevaluationAddress, siteAddress, stationOfCode, stationOfPath } from './address.js';

describe('the station of a field', () => {
  it.each([
    ['timeZone', 'record', 'the clock of the record'],
    ['supply.faultLevelMva.min', 'supply', 'the supply'],
    ['loads.distorting', 'supply', 'loads stand in the single line'],
    ['target.powerFactor', 'need', 'the target is the need’s slider'],
    ['bank.stages[0].ratedKvar', 'bank', 'a stage'],
    ['catalogue.ratedV', 'bank', 'what can be bought'],
    ['papers.tariff', 'money', 'a shared paper stands in for the tariff'],
    ['bank.mainDevice.ratedA', 'network', 'what is fitted stands beside the table of devices'],
    ['bank.stages[2].fuseA', 'network', 'of a stage as well'],
    ['bank.stages[0].reactorPct', 'bank', 'but its ratio is the stage’s own'],
    ['place.ambientMaxC', 'network', 'where the bank stands'],
    ['control.stepDelayS', 'bank', 'how the controller works'],
    ['control.currentTransformer.place', 'network', 'what it looks at'],
    ['tariff.clauses[1].ratchet.pct', 'money', 'a clause'],
  ])('%s is %s: %s', (path, station) => {
    expect(stationOfPath(path)).toBe(station);
  });
});

describe('an address', () => {
  it('opens what it was made for', () => {
    const made = siteAddress('4197cbe0', 'network', { field: 'bank.stages[2].fuseA' });
    expect(readAddress(made)).toEqual({
      page: 'site',
      siteId: '4197cbe0',
      station: 'network',
      field: 'bank.stages[2].fuseA',
      figure: null,
    });
  });

  it('holds a bank against a revision, or against the latest where the number is none', () => {
    expect(readAddress(reevaluationAddress('4197cbe0', 3))).toEqual({
      page: 'reevaluation',
      siteId: '4197cbe0',
      revision: 3,
    });
    for (const hash of [
      reevaluationAddress('4197cbe0'),
      '#/sites/4197cbe0/reevaluation?revision=0',
      '#/sites/4197cbe0/reevaluation?revision=x',
    ])
      expect(readAddress(hash)).toEqual({ page: 'reevaluation', siteId: '4197cbe0', revision: null });
  });

  it('that leads nowhere says so, rather than opening something else', () => {
    for (const hash of [
      '#/elsewhere',
      '#/papers/2',
      '#/sites/4197cbe0/bank/more',
      '#/sites/4197cbe0/wiring',
      '#/sites',
    ]) {
      expect(readAddress(hash).page).toBe('unknown');
    }
  });

  it('of a remark without a field is the station it is about', () => {
    const codes = [
      'money.sameLoad',
      'target.missed',
      'layout.noCandidate',
      'loads.fast',
      'record.partYear',
      'peak.near',
    ];
    expect(codes.map(stationOfCode)).toEqual(['money', 'need', 'bank', 'supply', 'record', 'network']);
  });
});
