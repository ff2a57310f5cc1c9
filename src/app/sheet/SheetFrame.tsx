/** The frame of a drawing sheet with its grid letters and numbers and the centring marks, as drawing sheets have them (ISO 5457). */
const COLUMNS = ['1', '2', '3', '4', '5', '6', '7', '8'];
const ROWS = ['A', 'B', 'C', 'D', 'E', 'F'];

export function SheetFrame() {
  return (
    <div className="sheet-frame" aria-hidden="true">
      {(['top', 'bottom'] as const).map((edge) => (
        <div key={edge} className={`zones ${edge}`}>
          {COLUMNS.map((name) => (
            <span key={name}>{name}</span>
          ))}
        </div>
      ))}
      {(['left', 'right'] as const).map((edge) => (
        <div key={edge} className={`zones ${edge}`}>
          {ROWS.map((name) => (
            <span key={name}>{name}</span>
          ))}
        </div>
      ))}
    </div>
  );
}
