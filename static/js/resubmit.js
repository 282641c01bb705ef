// A choice that changes the form asks for the changed form at once, by the button beside it.
export function start(select) {
  const button = select.parentElement.querySelector("[data-without-script]");
  if (button) select.addEventListener("change", () => select.form.requestSubmit(button));
}
