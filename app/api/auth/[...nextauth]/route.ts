import NextAuth from 'next-auth';
import { authOptions } from '@/lib/auth/auth-options';

type Context = { params: Promise<{ nextauth: string[] }> };
const handler = (request: Request, context: Context): Promise<Response> => NextAuth(authOptions())(request, context) as Promise<Response>;
export { handler as GET, handler as POST };
