/** The one function of tar-fs that is used here; the package ships no types. */
declare module 'tar-fs' {
  export function extract(folder: string, options?: { readonly chown?: boolean }): NodeJS.WritableStream
}
