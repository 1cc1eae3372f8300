import { zodResolver } from "@hookform/resolvers/zod";
import { useQuery } from "@tanstack/react-query";
import { useForm } from "react-hook-form";
import { useNavigate, useSearchParams } from "react-router-dom";
import { type SignIn, signInSchema } from "#shared/schemas/identity";
import { problemOf } from "../../lib/api";
import { applyProblem } from "../../lib/form-problem";
import { useDocumentTitle } from "../../lib/use-document-title";
import { Button } from "../../ui/button";
import { Field, FieldError } from "../../ui/field";
import { PageTitle } from "../../ui/page-title";
import { TextInput } from "../../ui/text-input";
import { DemoSignIns } from "./demo-sign-ins";
import { demoQuery, useSignIn } from "./queries";

/** Only an address of this product may be gone to after signing in. */
export function safeReturn(to: string | null): string {
  return to !== null && /^\/(?![/\\])/.test(to) ? to : "/";
}

export function SignInPage() {
  useDocumentTitle("Sign in");
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const signIn = useSignIn();
  const { data: demo } = useQuery(demoQuery);
  const form = useForm<SignIn>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: "", password: "" },
  });
  const { errors } = form.formState;
  const submit = form.handleSubmit((input) =>
    signIn.mutate(input, {
      onSuccess: () => navigate(safeReturn(search.get("to")), { replace: true }),
      onError: (error) => {
        const problem = problemOf(error);
        if (!applyProblem(form, problem)) {
          form.setError("root", { message: problem.detail ?? problem.title });
        }
      },
    }),
  );
  return (
    <div className="grid gap-x-20 gap-y-10 md:grid-cols-[22rem_1fr]">
      <div>
        <PageTitle>Sign in</PageTitle>
        <form onSubmit={submit} noValidate className="mt-6 flex flex-col gap-4">
          <Field label="E-mail" error={errors.email?.message}>
            <TextInput type="email" autoComplete="username" {...form.register("email")} />
          </Field>
          <Field label="Password" error={errors.password?.message}>
            <TextInput type="password" autoComplete="current-password" {...form.register("password")} />
          </Field>
          {errors.root?.message && <FieldError>{errors.root.message}</FieldError>}
          <div>
            <Button variant="main" type="submit" busy={signIn.isPending}>
              Sign in
            </Button>
          </div>
        </form>
      </div>
      {demo && (
        <DemoSignIns
          demo={demo}
          onChoose={(email) => {
            form.reset({ email, password: demo.password });
            void submit();
          }}
        />
      )}
    </div>
  );
}
