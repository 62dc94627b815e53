import NextAuth from 'next-auth';
import { authOptions } from '@/lib/auth/auth-options';
import { sessionToken } from '@/lib/web/session';

type Context = { params: Promise<{ nextauth: string[] }> };
const handler = async (request: Request, context: Context): Promise<Response> => NextAuth(authOptions(await sessionToken()))(request, context) as Promise<Response>;
export { handler as GET, handler as POST };
