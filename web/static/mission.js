// The mission page beyond plain forms: Alt and an arrow move the leg that holds the
// focus, and the focus goes with a leg that moves, to a new one, or to the neighbour of one removed.
"use strict";
(() => {
  const byId = (id) => document.getElementById(id);
  const cards = () => document.querySelectorAll("#form-legs .leg-card").length;

  document.addEventListener("keydown", (e) => {
    if (!e.altKey || e.ctrlKey || e.metaKey || e.shiftKey || !/^Arrow(Up|Down)$/.test(e.key)) return;
    const card = e.target.closest?.("#form-legs .leg-card");
    if (!card || e.target.localName === "select") return; // Alt and an arrow open a choice
    e.preventDefault();
    const button = byId(`${card.id}-${e.key === "ArrowUp" ? "up" : "down"}`);
    if (!button) return;
    button.focus(); // what was typed is sent as it is when a field is left
    button.click();
  });

  const going = new WeakMap(); // request -> the action under way
  document.addEventListener("htmx:before:request", (e) => {
    const { ctx } = e.detail;
    const action = ctx.sourceElement.id === "form-legs" && ctx.request.body.get("action");
    if (action) going.set(ctx, action);
  });
  document.addEventListener("htmx:finally:request", (e) => {
    const { ctx } = e.detail, action = going.get(ctx);
    if (!action || ctx.status !== "swapped" || ctx.response?.status >= 400) return;
    const [verb, arg] = action.split(" "), i = Number(arg);
    const wanted = {
      "move-leg-up": [`leg-${i - 1}-up`, `leg-${i - 1}-down`],
      "move-leg-down": [`leg-${i + 1}-down`, `leg-${i + 1}-up`],
      "insert-leg": [`f-legs-${i + 1}-name`],
      "duplicate-leg": [`f-legs-${i + 1}-name`],
      "add-leg": [`f-legs-${cards() - 1}-name`],
      "remove-leg": [`leg-${Math.min(i, cards() - 1)}-remove`],
    }[verb] || [];
    const to = wanted.map(byId).find(Boolean);
    if (!to) return;
    to.focus();
    to.closest(".leg-card").scrollIntoView({ block: "nearest" });
  });
})();
