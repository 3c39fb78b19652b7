// Package exchange writes what other people's programs take from a result: setting-out tables as CSV and quantities as XLSX. It
// works on a result file alone, so that both can be made again from a finished folder. Lengths are m, volumes m3. The same result
// gives the same bytes.
package exchange
