/** While files are held over the sheet: where they would go. */
export function DropVeil({ over }: { over: boolean }) {
  if (!over) return null;
  return (
    <div className="pointer-events-none fixed inset-3 z-20 flex items-end justify-center border-2 border-dashed border-pen p-6">
      <p className="t-section bg-penw px-4 py-2 text-pen">Drop to take these files in</p>
    </div>
  );
}
