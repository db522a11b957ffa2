/** How presence threads are read, in one line. */
export const THREADS_LEGEND = 'A ring: arrives. Thick: plays. Half as thick: gets ready. Thin: waits. A gap: meal or break. A bar: may go.';
