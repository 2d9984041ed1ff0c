import { ApiError } from '@/shared/api-client';

/** What an error of the server says to the person, with the id under which it was logged. */
export function errorOf(error: Error): { message: string; requestId: string | null } {
  return {
    message: error.message,
    requestId: error instanceof ApiError ? error.requestId : null,
  };
}
