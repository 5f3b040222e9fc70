import { handleAuthRequest } from '@/lib/auth/handle-auth-request';

export const GET = handleAuthRequest;
export const POST = handleAuthRequest;
