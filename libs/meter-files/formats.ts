import { readCsv } from './csv/read-csv.js';
import { isCim, isEspi, isMscons, isNem12, isParquet, isPlainText, isProfileReadout, isXlsx } from './format-starts.js';
import type { MeterFormat } from './meter-format.js';
import { isQuadrantRows } from './quadrant-rows/quadrant-line.js';

/**
 * Every format that is read, in the order in which a file is tried against them; delimited text takes what is left. A
 * reader is loaded when a file is its own: together they take longer to load than most files to read.
 */
export const FORMATS: readonly MeterFormat[] = [
  {
    name: 'nem12',
    title: 'NEM12 interval meter data',
    described: ['AEMO, Meter Data File Format Specification NEM12 & NEM13, version 1.06, 1 December 2017'],
    recognises: isNem12,
    read: async (bytes, options) => (await import('./nem12/read-nem12.js')).readNem12(bytes, options),
  },
  {
    name: 'quadrant-rows',
    title: 'Quarter-hour rows by quadrant with a season flag',
    described: [
      'IEC 62053-23, annex on the geometric representation of active and reactive power (the four quadrants)',
      'IEC 62056-6-1, value group C, 1 and 2 (active energy), 5 to 8 (reactive energy of quadrants I to IV)',
    ],
    recognises: isQuadrantRows,
    read: async (bytes, options) =>
      (await import('./quadrant-rows/read-quadrant-rows.js')).readQuadrantRows(bytes, options),
  },
  {
    name: 'mscons',
    title: 'MSCONS, metered services consumption report (UN/EDIFACT)',
    described: [
      'UN/CEFACT, United Nations Directories for EDIFACT, message MSCONS, https://service.unece.org/trade/untdid/d04b/trmd/mscons_c.htm',
      'ISO 9735-1:2002, EDIFACT application level syntax rules',
      'IEC 62056-61:2006, Object identification system (OBIS)',
    ],
    recognises: isMscons,
    read: async (bytes, options) => (await import('./mscons/read-mscons.js')).readMscons(bytes, options),
  },
  {
    name: 'profile-readout',
    title: 'Load profile P.01 or P.02 of a meter read-out',
    described: [
      'IEC 62056-21:2002, Direct local data exchange, data sets of the read-out',
      'VDEW, Lastenheft Elektronische Lastgangzähler, version 2.1.2, form of the load profile P.01 (from memory)',
      'IEC 62056-61:2006, Object identification system (OBIS)',
    ],
    recognises: isProfileReadout,
    read: async (bytes, options) =>
      (await import('./profile-readout/read-profile-readout.js')).readProfileReadout(bytes, options),
  },
  {
    name: 'xlsx',
    title: 'Workbook with a sheet of rows under a header',
    described: ['ECMA-376 / ISO/IEC 29500-1, Office Open XML File Formats: SpreadsheetML, and part 2, Open Packaging'],
    recognises: isXlsx,
    read: async (bytes, options) => (await import('./xlsx/read-xlsx.js')).readXlsx(bytes, options),
  },
  {
    name: 'parquet',
    title: 'Parquet with named columns',
    described: ['Apache Parquet file format specification, https://parquet.apache.org/docs/file-format/'],
    recognises: isParquet,
    read: async (bytes, options) => (await import('./parquet/read-parquet.js')).readParquet(bytes, options),
  },
  {
    name: 'cim-meter-readings',
    title: 'MeterReadings message of the Common Information Model',
    described: [
      'IEC 61968-9:2013, Interfaces for meter reading and control; its code lists as the CIM17 class model prints them, the order of the 18 codes from memory',
    ],
    recognises: isCim,
    read: async (bytes, options) => (await import('./cim/read-cim.js')).readCim(bytes, options),
  },
  {
    name: 'espi',
    title: 'ESPI (Green Button) feed of usage data',
    described: [
      'NAESB REQ.21, Energy Services Provider Interface, schema espi.xsd, version 4.0, 13 December 2023; forms of 1.1 to 3.3 from memory',
      'RFC 4287, The Atom Syndication Format, https://www.rfc-editor.org/rfc/rfc4287',
    ],
    recognises: isEspi,
    read: async (bytes, options) => (await import('./espi/read-espi.js')).readEspi(bytes, options),
  },
  {
    name: 'csv',
    title: 'Delimited text with a header row',
    described: [
      'RFC 4180, Common Format and MIME Type for Comma-Separated Values (CSV) Files, https://www.rfc-editor.org/rfc/rfc4180',
      'ISO 8601-1:2019, Date and time',
    ],
    recognises: isPlainText,
    read: readCsv,
  },
];
