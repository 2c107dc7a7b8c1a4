import type { Messages } from './message.js';

/** What is said of tariffs, prices and the choice by money. */
export const MONEY_MESSAGES: Messages = {
  'default.tariff.decimals': {
    level: 'to be noted',
    text: 'Every line of a bill is rounded to {value} decimals.',
    consequence: 'Read it off a real bill.',
  },
  'default.tariff.taxPct': {
    level: 'to be noted',
    text: 'Bills are taken without tax.',
    consequence: 'Give the tax that the site cannot recover.',
  },
  'default.tariff.demandS': {
    level: 'to be noted',
    text: 'Demand is the mean of {value}, the record’s interval.',
    consequence: 'Read the tariff; longer blocks lower a peak.',
  },
  'default.finance.discountPct': {
    level: 'to be noted',
    text: 'Money is discounted at {value} a year.',
    consequence: 'Ask the site’s own rate.',
  },
  'default.finance.horizonYears': {
    level: 'to be noted',
    text: 'Costs and savings are reckoned over {value:year|years}, without a residual value.',
    consequence: 'Ask how long the site looks ahead.',
  },
  'default.finance.billGrowthPct': {
    level: 'to be noted',
    text: 'Bills grow by {value} a year.',
    consequence: 'Take a rate that both sides can stand by.',
  },
  'default.finance.costGrowthPct': {
    level: 'to be noted',
    text: 'Maintenance and replacements grow by {value} a year.',
    consequence: 'Take a rate that both sides can stand by.',
  },
  'papers.tariff': {
    level: 'to be noted',
    text: 'The tariff is the shared paper “{name}”, version {version}, which holds from {date}.',
    consequence: 'A later version changes nothing here until the site is planned again.',
  },
  'papers.prices': {
    level: 'to be noted',
    text: 'The prices are the shared paper “{name}”, version {version}, which holds from {date}.',
    consequence: 'A later version changes nothing here until the site is planned again.',
  },
  'prices.invented': {
    level: 'to be accepted',
    text: 'The price book is made up: it shows how costs are reckoned, not what anything costs.',
    consequence: 'Put real prices in before anything is decided.',
  },
  'prices.notYetValid': {
    level: 'to be accepted',
    text: 'The price book holds from {validFrom}; the plan is dated {asOf}.',
    consequence: 'Take the book of the day.',
  },
  'prices.outOfDate': {
    level: 'to be accepted',
    text: 'The price book held until {validTo}; the plan is dated {asOf}.',
    consequence: 'Ask for new prices.',
  },
  'default.catalogue.evenSteps': {
    level: 'to be noted',
    text: 'Levels of a bank lie no further apart than its smallest stage.',
    consequence: 'Allow uneven steps, if the controller can use them.',
  },
  'default.catalogue.mustMeetTarget': {
    level: 'to be noted',
    text: 'The target has to hold in every month, whatever it costs.',
    consequence: 'Say so, if money alone decides.',
  },
  'default.catalogue.maxTotalKvar': {
    level: 'to be noted',
    text: 'No bank is tried that has a stage to spare over the record’s greatest kvar.',
    consequence: 'Give the most that may be built.',
  },
  'money.idealControl': {
    level: 'to be noted',
    text: 'Savings are those of a controller that decides on the averages of the interval it acts in.',
    consequence: 'Read the saving as a range: it is an estimate, not a guarantee.',
  },
  'money.sameLoad': {
    level: 'to be noted',
    text: 'The load of the record comes back every year.',
    consequence: 'Ask what is to be added or closed.',
  },
  'search.newBank': {
    level: 'information',
    text: 'Of all candidates that hold, this bank has the greatest net present value, {value}.',
    consequence: '',
  },
  'search.keepBank': {
    level: 'information',
    text: 'Today’s bank is worth keeping: no new one adds to its net present value of {value}.',
    consequence: 'Nothing is to be built.',
  },
  'search.nothing': {
    level: 'information',
    text: 'Nothing is recommended: no candidate holds.',
    consequence: 'Nothing is to be built.',
  },
  'search.nothingPays': {
    level: 'information',
    text: 'Nothing is recommended: the best bank has a net present value of {value}.',
    consequence: 'Nothing is to be built for money’s sake.',
  },
  'search.onlyWatch': {
    level: 'to be accepted',
    text: 'No candidate stands clear of every limit; the best of those near one is proposed.',
    consequence: 'Accept what stands near a limit, or widen the catalogue.',
  },
  'search.onlyAvoid': {
    level: 'blocks issue',
    text: 'Every candidate of the catalogue is over a limit.',
    consequence: 'Widen the catalogue, or settle the distortion at its sources.',
  },
  'search.bestAttainable': {
    level: 'to be accepted',
    text: 'No candidate holds the target {targetPowerFactor} in every month; the best of them holds {powerFactor}.',
    consequence: 'Allow more stages or more kvar, or give the demand up.',
  },
};
