import { demoAccountsSchema, meSchema, signInSchema, switchTeamSchema } from "#shared/schemas/identity";
import { route } from "../../http/route";
import { demoAccounts, describeMe, signIn, signOut, switchTeam } from "./service";

export const identityRoutes = [
  route({
    method: "post",
    path: "/auth/sign-in",
    access: "public",
    tag: "Sign-in",
    summary: "Start a session; the cookie comes with the answer",
    body: signInSchema,
    handle: async (context, { body }, { request, response }) => {
      response.append("set-cookie", await signIn(context, body, request.get("cookie") ?? ""));
      return undefined;
    },
  }),
  route({
    method: "post",
    path: "/auth/sign-out",
    access: "signed-in",
    tag: "Sign-in",
    summary: "End the session",
    handle: async (context, _input, { response }) => {
      response.append("set-cookie", await signOut(context));
      return undefined;
    },
  }),
  route({
    method: "get",
    path: "/auth/me",
    access: "signed-in",
    tag: "Sign-in",
    summary: "Say who is signed in, for which team, with which roles",
    response: meSchema,
    handle: (context) => describeMe(context),
  }),
  route({
    method: "post",
    path: "/auth/team",
    access: "signed-in",
    tag: "Sign-in",
    summary: "Move to another of one's teams",
    body: switchTeamSchema,
    handle: async (context, { body }, { response }) => {
      response.append("set-cookie", await switchTeam(context, body));
      return undefined;
    },
  }),
  route({
    method: "get",
    path: "/auth/demo",
    access: "public",
    tag: "Sign-in",
    summary: "List the demo accounts, in demo mode",
    response: demoAccountsSchema,
    handle: (context) => demoAccounts(context),
  }),
];
