/** What is wrong with a form as a whole: a refusal that belongs to no field, or a service that is away. */
export function FormError({ message }: { message: string | undefined | null }) {
  return <div role="alert">{message ? <p className="err err-list form-error">{message}</p> : null}</div>;
}
