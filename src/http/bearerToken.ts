/** @returns the token of `Authorization: Bearer TOKEN`; null without that header or with another scheme. */
export function bearerToken(request: Request): string | null {
  return /^bearer +(\S*)$/i.exec(request.headers.get('authorization')?.trim() ?? '')?.[1] ?? null;
}
