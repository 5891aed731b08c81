/** The files of the suite, in the order in which they run. */
export async function loadAll(): Promise<void> {
  await import('./language.suite');
  await import('./findings.suite');
  await import('./reading.suite');
  await import('./fixes.suite');
  await import('./completion.suite');
  await import('./formatting.suite');
  await import('./navigation.suite');
  await import('./names.suite');
  await import('./structure.suite');
  await import('./compare.suite');
  await import('./files.suite');
}
