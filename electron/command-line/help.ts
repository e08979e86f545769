export const generalHelp = `Lampwright: emission line diagnostics for hydrogen-bearing discharge lamps.

lampwright diagnose PATH... [--bench FILE] [--dark FILE] [--response FILE]
                            [--profile FILE] [--mirror FILE] [--source FILE --through FILE]
                            [--json | --ndjson | --csv] [--report FILE.html] [--monte-carlo]
    Excitation temperature and electron density of each recording, with checks and a verdict.
    PATH is a recording (a text table) or a folder. Of a folder the files that end in .csv, .txt,
    .tsv, .dat or .asc are taken, sorted by name; hidden files are not.
    --bench FILE     describes lamp, spectrometer and choices. A folder that holds a bench.json uses it
                     when --bench is not given; a single file uses only what is given.
    --dark FILE      recording with the light off. Overrides the bench file's.
    --response FILE  relative spectral response. Overrides the bench file's.
    --profile FILE   a lamp with sharp lines (mercury, neon): the instrument profile is measured on them.
    --mirror FILE    the same lamp with a mirror behind it: measures the optical depth of each line.
    --source FILE --through FILE
                     a continuum source behind the tube, alone and through the burning tube: the same by
                     absorption. All these may stand in the bench file, and none of them is taken for a
                     recording of a folder.
    --json           one PATH that is a file: one JSON object; several, or a folder: an array of them
    --ndjson         one JSON object a line, in input order, as each is done
    --csv            one row a recording
    --report FILE    also writes a report with figures. With several recordings, name a folder that
                     exists: each report is called after its recording.
    --monte-carlo    also checks each temperature's interval by drawing all inputs, and uses the interval of
                     the trials where they do not confirm it; takes about a second a recording

lampwright simulate --temperature K --electron-density PER_M3 [--bench FILE] [--seed N] [--count N]
                    [--deuterium SHARE] [--optical-depth DEPTH] --out PATH
    Writes a recording with known truth. With --count above 1, PATH is a folder.
    --deuterium SHARE      share of deuterium among the atoms, 0 to 0.99; 0 when absent
    --optical-depth DEPTH  of the tube at the peak of H-alpha, 0 to 20; 0 when absent

lampwright lines [--from NM --to NM] [--json]
    The hydrogen lines of a diagnosis, and the impurity and calibration lines that the program knows.

lampwright --help | --version

Exit status: 0 done, whatever the verdict; 1 some input could not be used (the rest is still done,
one line each on standard error); 2 wrong usage.
`;
