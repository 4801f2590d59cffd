/** Hands the reader a file made on this page. */
export function saveFile(page: Document, name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = page.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}

/** A table as comma-separated values (RFC 4180), every cell quoted where it must be. */
export function asCsv(rows: readonly (readonly (string | number | null)[])[]): string {
  const cell = (value: string | number | null): string => {
    const text = value === null ? '' : String(value);
    // A leading sign of a formula would be run by a spreadsheet; a quote before it keeps it text.
    const safe = typeof value === 'string' && /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
    return /[",\n\r]/.test(safe) ? `"${safe.replace(/"/g, '""')}"` : safe;
  };
  return rows.map((row) => row.map(cell).join(',')).join('\r\n') + '\r\n';
}
