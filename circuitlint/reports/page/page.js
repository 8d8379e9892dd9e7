(function () {
  "use strict";
  var at = function (id) { return document.getElementById(id); };
  var all = function (what, from) { return Array.prototype.slice.call((from || document).querySelectorAll(what)); };

  var severities = at("severities");
  if (severities) {
    severities.hidden = false;
    severities.addEventListener("change", function () {
      var wanted = all("input:checked", severities).map(function (box) { return box.value; });
      var shown = 0, items = all(".finding");
      items.forEach(function (item) {
        item.hidden = wanted.indexOf(item.dataset.severity) < 0;
        shown += item.hidden ? 0 : 1;
      });
      at("found").textContent = shown + " of " + items.length + " findings shown";
    });
  }

  var find = at("find"), list = at("list");
  if (find && list) {
    var words = at("words"), which = at("which"), order = at("order"), unfold = at("unfold");
    var given = all(".circuit", list);
    var texts = given.map(function (one) { return one.firstElementChild.textContent.toLowerCase(); });
    var place = new Map(given.map(function (one, index) { return [one, index]; }));
    var tags = given.map(function (one) { return one.querySelector("h3").textContent; });
    var margin = function (one) { return one.dataset.margin === "" ? Infinity : Number(one.dataset.margin); };
    var by = {
      given: function (a, b) { return place.get(a) - place.get(b); },
      margin: function (a, b) { var x = margin(a), y = margin(b); return x === y ? by.given(a, b) : x < y ? -1 : 1; },
      findings: function (a, b) { return b.dataset.findings - a.dataset.findings || by.given(a, b); },
      tag: function (a, b) { return tags[place.get(a)].localeCompare(tags[place.get(b)], "en", {numeric: true}) || by.given(a, b); }
    };
    var keeps = {
      all: function () { return true; },
      held: function (one) { return one.dataset.held === "1"; },
      clear: function (one) { return one.dataset.held === "0"; },
      open: function (one) { return one.dataset.open === "1"; }
    };
    var show = function () {
      var text = words.value.trim().toLowerCase(), shown = 0;
      given.forEach(function (one, index) {
        one.hidden = !keeps[which.value](one) || texts[index].indexOf(text) < 0;
        shown += one.hidden ? 0 : 1;
      });
      at("shown").textContent = shown + " of " + given.length + " circuits shown; printing prints these";
    };
    find.hidden = false;
    at("sheets").addEventListener("change", function () {
      document.body.classList.toggle("no-sheets", !this.checked);
    });
    words.addEventListener("input", show);
    which.addEventListener("change", show);
    order.addEventListener("change", function () {
      var sorted = given.slice().sort(by[order.value]), all = document.createDocumentFragment();
      sorted.forEach(function (one) { all.appendChild(one); });
      list.appendChild(all);
      show();
    });
    unfold.addEventListener("click", function () {
      var open = unfold.dataset.open !== "1";
      given.forEach(function (one) { if (!one.hidden) { one.open = open; } });
      unfold.dataset.open = open ? "1" : "0";
      unfold.textContent = open ? "Fold all shown" : "Unfold all shown";
    });
  }

  var folded = [];
  window.addEventListener("beforeprint", function () {
    folded = all("details:not([open])").filter(function (one) { return !one.closest("[hidden]"); });
    folded.forEach(function (one) { one.open = true; });
  });
  window.addEventListener("afterprint", function () {
    folded.forEach(function (one) { one.open = false; });
    folded = [];
  });
})();
