/** The texts of --help, for someone who has never seen the tool. */

export const help = `Platemark compiles a Markdown document into the lateral calculation of a
shear-wall building, with formulas, values put in, results, tables and sketches.

  platemark build FILE…    write the calculation beside each file
  platemark watch FILE…    show the calculation in a browser, anew at every save
  platemark check FILE…    say what is wrong and how the checks come out
  platemark audit FILE…    show that every printed line holds to its digits
  platemark trace FILE ID  say where a number came from
  platemark tidy FILE…     set the source in columns, without changing what it says
  platemark lsp            serve an editor: messages as you type, names, values

A FILE is a Markdown document; a folder stands for all .md files in it.
platemark COMMAND --help tells more. platemark --version prints the version.

What it writes is to be reviewed by the engineer of record; local codes govern.`

const texts = {
  build: `platemark build FILE… [--to html,pdf,md,json] [--out DIR] [--draft] [--list]

Works each document and writes:

  html   one page that needs nothing beside it (what you get without --to)
  pdf    the same on sheets of paper, with bookmarks, links and tags
  md     the same calculation as Markdown, with its sketches as SVG beside it;
         named NAME.worked.md when it is written beside its source
  json   every value, step, check and diagnostic, for other programs

  --out DIR   write there instead of beside the source
  --draft     write the pages in spite of errors, with a box at each and a banner
  --browser PROGRAM
              print the PDF with this Chrome, Chromium or Edge; PLATEMARK_BROWSER names one too.
              Without either an installed one is looked for, then the one that comes along
              (Linux on x86-64)
  --list      one line for each diagnostic

A document with errors leaves its pages as they were; its JSON is always written.
Exit code: 0 done, 1 errors, 2 wrong usage. A check that fails is a result, not an error.

  platemark build workshop.md
  platemark build calcs/ --to html,pdf --out out/`,
  watch: `platemark watch FILE… [--to html,pdf,md,json] [--out DIR] [--draft] [--open] [--port N]
                     [--editor TEMPLATE] [--list]

Shows each document in a browser, at an address of this machine that is printed, and follows every save:
only what changed is redrawn, each number that moved is marked with what it was, and the checks that
turned are listed first. A document with errors shows a box at each. A file that is missing or cannot be
read is waited for; so are pictures, templates and, in a folder, documents that come later. It runs
until it is ended with Ctrl+C.

Nothing is written unless --to is given: what is on the disk stays what you last built.

  --to FORMATS   write these too, after each save, as build does: pages of a sound document only
                 unless --draft is given, JSON always
  --out DIR      write there instead of beside the source
  --draft        write the pages in spite of errors, with a box at each and a banner
  --browser PROGRAM
                 print the PDF with this Chrome, Chromium or Edge
  --open         show the page in the system's own browser
  --port N       the port of the address; any free one without it. With a port of its own a page that is
                 open finds the program again after it was started anew
  --editor TEMPLATE
                 what opens a source line when a number is clicked twice: a program with its arguments, or an
                 address, with {path}, {line} and {column} in it; PLATEMARK_EDITOR names one too
  --list         one line for each diagnostic

Exit code: 0 ended, 1 the port is taken, 2 wrong usage.

  platemark watch workshop.md --open
  platemark watch calcs/ --to html,pdf --out out/
  platemark watch workshop.md --editor 'myeditor --line {line} {path}'`,
  check: `platemark check FILE… [--submittal] [--list]

Works each document, prints what is wrong with it and how its checks come out, and writes nothing.

  --submittal   say too what is missing before it goes out: entries of the title block, names of who
                made and who checked it, a cover to sign, revisions, sources of formulas
  --list        one line for each diagnostic

Exit code: 0 all well, 1 errors or failed checks, 2 wrong usage.

  platemark check workshop.md
  platemark check workshop.md --submittal`,
  audit: `platemark audit FILE… [--list]

Goes over every worked line of each document. Each printed number stands for all numbers that would
print the same; the line must be able to come to the printed result, and its text must read back
as the same numbers. Lines that do not hold are printed; nothing is written.

  --list      one line for each diagnostic

Exit code: 0 every line holds, 1 errors or lines that do not hold, 2 wrong usage.

  platemark audit workshop.md`,
  trace: `platemark trace FILE ID [--list]

Tells where the value ID came from: its formula, the values put in, the clause or derivation and the line of
the source, and the same for each value that it rests on, set in under it. Each is told once; nothing is
written. The page tells the same when a number is clicked.

  --list      one line for each diagnostic

Exit code: 0 told, 1 errors or no such value, 2 wrong usage.

  platemark trace workshop.md roof.CR.x`,
  tidy: `platemark tidy FILE… [--check]

Sets the blocks of each document in their canonical form: tables in columns, one space behind a colon and
around the = -> and <= of a line, comments of neighbouring lines below each other, no space at the end of a
line. Nothing that has a meaning changes, no line is added or taken away, and everything outside the
blocks stays as it is. Prints the name of each file that it rewrites. For - it reads the text piped in and
prints it tidied, which is what an editor calls.

  --check     write nothing; print the names of the files that are not tidy

Exit code: 0 done, or all tidy; 1 errors or, with --check, a file that is not tidy; 2 wrong usage.

  platemark tidy calcs/
  platemark tidy --check calcs/
  platemark tidy - < workshop.md`,
  lsp: `platemark lsp [--stdio]

A language server: an editor that speaks the Language Server Protocol starts it for Markdown files and talks to
it over its standard streams. In our blocks and quotes it gives

  messages      as you type, at their place, with what to do
  completion    topics, columns, settings, units, names, grid crossings, ids of values
  on pointing   a value with its formula, values put in, clause and line; what a column is
  places        where a name is given, and every use of it
  renaming      of a level, wall, construction, equation or grid line, everywhere or not at all
  formatting    as platemark tidy does
  outline       headings, blocks, walls and equations

It reads the text in the editor and, from the disk, the pictures and templates that the text names. It writes
nothing and opens no network. It ends when the editor ends it.

Exit code: 0 ended as asked, 1 the editor went away, 2 wrong usage.`,
} as const

export const helpFor = (command: keyof typeof texts): string => texts[command]
