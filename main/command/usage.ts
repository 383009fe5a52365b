import { programName } from '../../analysis/index.ts';

export const version = programName;

export const usage = `Usage:
  monobis read FILE…                      show what the importer understood of each export
  monobis quantify SHEET                  run the whole sheet
  monobis quantify SHEET --each FILE…     fit every trace of every FILE as an aliquot of the sheet
  monobis report SHEET --to OUT.html      write the report (.html, .csv or .json)

  --json      JSON on standard output (NDJSON with --each) in place of a table
  --version   name and version
  --help      this text

Exit codes: 0 done; 1 a fault in the program; 2 the input cannot be used;
3 done, but at least one trace or aliquot was refused and is listed.
`;
