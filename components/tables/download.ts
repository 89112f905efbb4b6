/** Hands a text to the browser as a CSV file; the mark in front lets spreadsheets read it as UTF-8. */
export function downloadCsv(name: string, text: string) {
  const address = URL.createObjectURL(new Blob(['\ufeff', text], { type: 'text/csv;charset=utf-8' }));
  const link = document.createElement('a');
  link.href = address;
  link.download = name.endsWith('.csv') ? name : `${name}.csv`;
  link.click();
  setTimeout(() => URL.revokeObjectURL(address), 0);
}
