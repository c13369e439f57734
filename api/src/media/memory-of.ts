import { readFile } from 'node:fs/promises';

const PAGE_BYTES = 4096;

/**
 * The memory in use by a process and all that it started, in bytes, as the kernel counts it; 0 when it is
 * gone. Shared pages count for each process, so the true sum is no more than this.
 */
export async function memoryOf(pid: number): Promise<number> {
  try {
    const statm = await readFile(`/proc/${pid}/statm`, 'utf8');
    const own = Number(statm.split(' ')[1]) * PAGE_BYTES;
    const children = (await readFile(`/proc/${pid}/task/${pid}/children`, 'utf8')).trim();
    if (children === '') return own;
    const theirs = await Promise.all(children.split(' ').map((child) => memoryOf(Number(child))));
    return theirs.reduce((sum, bytes) => sum + bytes, own);
  } catch {
    return 0;
  }
}
