import { factsOf, quantities } from './quantities.ts';

/** The grammar of the `columns` parameter in short, for people who read the interface's documents. */
export const columnsGrammar = `columns = item *("," item)
item    = column / option
column  = "skip" / quantity [":" unit]            (by order: every column of a row is listed)
        / address "=" quantity [":" unit]         (addressed: all other columns are ignored)
address = column number, counted from 1 / header text in double quotes, a quote in it doubled
option  = "reference=" ohms / "delimiter=" ("comma" / "semicolon" / "tab" / "blanks")
        / "decimal=" ("point" / "comma")
Case and blanks around items do not matter. By order and addressed are not mixed. In a URL the
double quote is %22 and a blank %20.
Examples: frequency:MHz,resistance,reactance
          frequency:kHz,skip,swr,reference=75
          1=frequency:MHz,4=swr
          "Freq (MHz)"=frequency:MHz,"RL"=return_loss,decimal=comma
Quantities, with their units (a unit in parentheses may be left out):
${quantities.map(line).join('\n')}`;

function line(quantity: (typeof quantities)[number]): string {
  const { units, mustSayUnit, meaning } = factsOf(quantity);
  const [first, ...others] = units;
  const shown = mustSayUnit ? units : [`(${first})`, ...others];
  return `  ${quantity}${units.length === 0 ? '' : `:${shown.join('|')}`} - ${meaning}`;
}
