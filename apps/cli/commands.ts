import type { Command } from './command.js';

const METER_OPTIONS = { format: 'FORMAT', map: 'FILE', 'time-zone': 'ZONE' };

const SHEET_OPTIONS = { paper: 'SIZE', logo: 'FILE', language: 'LANGUAGE' };

const METER_LISTS = { extend: 'METER-FILE' };

const METER_DETAILS = `  --extend FILE      a further meter file that extends or corrects the record, read by the same options; may stand
                     several times, and each is laid over what stands before it; "overlap" in the map says which
                     counts where one disagrees: "earlier" or "later", or a list with one for each FILE
  --format FORMAT    format of the meter file, where it is not recognised by itself
  --map FILE         JSON: columns, separator, decimal mark, what stamps mark, repairs; also an answer to a question
  --time-zone ZONE   zone of local stamps: "Europe/Dublin", "UTC", "+10:00"
`;

const EXPORT_OPTIONS = { export: 'OUT', calculation: 'OUT', figures: 'FOLDER' };

const PLAN_DETAILS = `  --load METER-FILE  the meter's record; without it the site's estimate (bills, equipment list)
  --pdf OUT          write the proposal there
  --paper SIZE       sheet of the proposal: A4 (where not given) or Letter
  --language LANGUAGE
                     language of the proposal: en (where not given) or de
  --logo FILE        the site's logo for the proposal, PNG or JPEG, at most 262144 bytes and 2000000 pixels
  --export OUT       write the plan with all its parts; OUT ends in .json, .csv (path, kind, value) or .xlsx
  --calculation OUT  write the calculation sheet alone: .json, .csv or .xlsx
  --figures FOLDER   write single-line diagram and figures there as SVG
${METER_DETAILS}`;

/** Every command; a command's own file is loaded when it is called. */
export const COMMANDS: Record<string, Command> = {
  read: {
    operand: 'METER-FILE',
    values: { keep: 'OUT', ...METER_OPTIONS },
    lists: METER_LISTS,
    flags: ['json', 'intervals', 'csv'],
    does: 'read a meter file and say what it holds',
    details: `${METER_DETAILS}  --intervals        with every valid interval (JSON)
  --csv              the intervals as CSV in UTC
  --keep OUT         write the record to be read back to the same hash: .json, .csv or .xlsx
`,
    load: () => import('./read.js'),
  },
  plan: {
    operand: 'SITE',
    several: true,
    values: { pdf: 'OUT', ...SHEET_OPTIONS, ...EXPORT_OPTIONS, ...METER_OPTIONS },
    lists: { load: 'METER-FILE', ...METER_LISTS },
    flags: ['json'],
    does: 'design a bank for a site and judge it',
    details: `${PLAN_DETAILS}  several SITEs, each with a --load of its own in their order, give one table
`,
    load: () => import('./plan.js'),
  },
  assess: {
    operand: 'SITE',
    values: {
      ...{ load: 'METER-FILE', pdf: 'OUT', before: 'SITE', 'before-load': 'METER-FILE' },
      ...SHEET_OPTIONS,
      ...EXPORT_OPTIONS,
      ...METER_OPTIONS,
    },
    lists: METER_LISTS,
    flags: ['json'],
    does: "judge the site's own bank",
    details: `${PLAN_DETAILS}  --before SITE      judge the bank again beside what it was: the site file of then. Says first what to keep out where a
                     limit is passed, then what changed in numbers, what would mend it, and since when
  --before-load FILE the meter's record of then; the same record where not given
`,
    load: () => import('./assess.js'),
  },
  site: {
    operand: 'SITE',
    values: { export: 'OUT' },
    lists: {},
    flags: ['json'],
    does: 'check a site file and write it in another form',
    details: `  --export OUT       write it as .json, .csv or .xlsx; each is read as a site file again, with the same hash
`,
    load: () => import('./site.js'),
  },
  scan: {
    operand: 'SITE',
    values: { level: 'KVAR', orders: 'A:B:STEP', corner: 'K', netlist: 'OUT' },
    lists: {},
    flags: ['json'],
    does: 'network impedance over harmonic order',
    details: `  --level KVAR       the level that is connected; all stages where not given
  --orders A:B:STEP  orders to compute, 1:50:0.02 where not given
  --corner K         that corner alone, in the order of the list, 0 for the nominal one
  --netlist OUT      write the network at that level and corner (nominal where not given) as a netlist for a circuit
                     simulator, by default at the orders present; the gravest closing beside it, .inrush in its name
`,
    load: () => import('./scan.js'),
  },
  import: {
    operand: 'FILE',
    values: { ...METER_OPTIONS, load: 'METER-FILE', export: 'OUT', calculation: 'OUT', site: 'OUT' },
    lists: METER_LISTS,
    flags: ['json', 'again'],
    does: 'take an exported plan or calculation sheet back',
    details: `  FILE               what plan --export or --calculation wrote, or the server gave: .json, .csv or .xlsx; refused where
                     anything of it was changed since
  --site OUT         write the site file that the plan was made from: .json, .csv or .xlsx
  --export OUT       write the plan in another form, with the same hash
  --calculation OUT  write the calculation sheet in another form, with the same hash
  --again            compute the plan again from what it was made from and compare every value; needs
  --load METER-FILE  the meter's record, unless it rests on an estimate
${METER_DETAILS}                     Exit: 0 as it was exported, and the same where it was computed again; 6 where it was not the
                     same; 3 refused
`,
    load: () => import('./import.js'),
  },
  verify: {
    operand: 'FILE',
    values: { database: 'URL' },
    lists: {},
    flags: ['json'],
    does: 'say whether a paper is what was approved',
    details: `  FILE               the PDF, an exported plan or calculation sheet; or the 16 digits behind "content" at the head of a
                     page, for a scan
  --database URL     of the installation that issued it, "sqlite:FILE" or "postgres://…"; else DB_URL, or the server's
                     own file under DATA_DIR; it is only read
                     Exit: 0 approved as it stands, also signed afterwards; 6 superseded, withdrawn, a draft or altered;
                     3 not ours
`,
    load: () => import('./verify.js'),
  },
};

/**
 * What the program does, for a terminal.
 * @returns text with a final line break
 */
export function overview(): string {
  const lines = Object.entries(COMMANDS).map(
    ([name, { operand, does }]) => `  ${`${name} ${operand}`.padEnd(18)} ${does}\n`,
  );
  return `varwright COMMAND …   plans power-factor-correction banks from a meter's record

${lines.join('')}
Every command takes --json (one JSON document on stdout, on failure too) and --help; - reads standard input.
Exit: 0 done, 1 fault of ours, 2 usage, 3 input refused or a question, 6 done with a verdict of avoid, 130 interrupted.
`;
}

/**
 * How one command is called.
 * @param name a key of COMMANDS
 * @returns text with a final line break
 */
export function helpOf(name: string): string {
  const command = COMMANDS[name];
  if (command === undefined) throw new Error(`no command ${name}`);
  return `varwright ${name} ${command.operand} [options]   ${command.does}

${command.details}  --json             one JSON document on stdout, on failure too
`;
}
