import { useMatches } from 'react-router-dom';
import { may } from '#shared/access/permissions.ts';
import type { Permission, Role } from '#shared/access/permissions.ts';

function permissionOf(handle: unknown): Permission | null {
  return typeof handle === 'object' && handle !== null && 'permission' in handle
    ? (handle.permission as Permission)
    : null;
}

/**
 * Whether somebody may be at this address, by the permission that the router names beside it. The server asks
 * again at every call; this only spares people a page of refusals.
 */
export const useMayBeHere = (roles: readonly Role[]): boolean =>
  useMatches().every(({ handle }) => {
    const permission = permissionOf(handle);
    return permission === null || may(roles, permission);
  });
