// Choosing another way of giving something shows its fields at once, as the button "Change" does without scripts.
export function start(select) {
  select.addEventListener("change", () => {
    const button = select.parentElement.querySelector("button[name=do]");
    select.form.requestSubmit(button);
  });
}
