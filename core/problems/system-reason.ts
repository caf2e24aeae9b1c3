const PLAIN: Readonly<Record<string, string>> = {
  EACCES: 'permission denied',
  EADDRINUSE: 'the port is in use',
  EDQUOT: 'the share of the disk that is yours is full',
  EEXIST: 'it exists and is not a folder',
  EFBIG: 'a file of this size is not allowed here',
  EIO: 'the disk did not do it',
  EISDIR: 'it is a folder',
  ENOENT: 'no such file or folder',
  ENOSPC: 'the disk is full',
  ENOTDIR: 'a part of the path is not a folder',
  EPERM: 'operation not permitted',
  EROFS: 'the file system is read-only',
}

/** Why a file or a port could not be had, as the end of a sentence, from what the system threw; never its stack. */
export function systemReason(error: unknown): string {
  const code = typeof error === 'object' && error !== null && 'code' in error ? String(error.code) : ''
  if (Object.hasOwn(PLAIN, code)) return PLAIN[code]
  return error instanceof Error ? error.message : String(error)
}
