// Marks the page as scripted, so that the plain Save buttons can step back, and
// opens a group of inputs whose field was refused after an edit was swapped in.
"use strict";
document.documentElement.classList.add("scripted");
document.addEventListener("htmx:after:swap", () => {
  const bad = document.querySelector("#bench .field.has-error");
  const group = bad && bad.closest("details");
  if (group) group.open = true;
});
// Undo and redo by keyboard, except inside a field, which undoes its own typing.
document.addEventListener("keydown", (e) => {
  if (!(e.ctrlKey || e.metaKey) || e.altKey) return;
  if (/^(INPUT|TEXTAREA|SELECT)$/.test(document.activeElement?.tagName || "")) return;
  const key = e.key.toLowerCase();
  const id = key === "z" && !e.shiftKey ? "undo-form" : key === "y" || (key === "z" && e.shiftKey) ? "redo-form" : "";
  const button = id && document.querySelector(`#${id} button:not([disabled])`);
  if (button) { e.preventDefault(); button.click(); }
});
