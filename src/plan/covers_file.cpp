#include "plan/covers_file.h"

#include <algorithm>
#include <cmath>

#include "plan/plan_text.h"
#include "plan/table_reader.h"
#include "plan/toml_text.h"
#include "plan/words.h"
#include "sunfall/covers.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

enum class Coated { outer, inner, both };

const TextKey kSource{"source", std::nullopt, ""};
const PathKey kMeasured{"measured", "none (made of sheets)"};
const NumberKey kIndex{"index", {1, 3, "", "The refractive index; glass has 1.526"}};
const NumberKey kThickness{"thickness_mm", {0, 100, "mm", ""}};
const NumberKey kAbsorption{"absorption", {0, 1e6, "m-1", "Glass has 4 to 32"}};
const NumberKey kInternal{"internal",
                          {0, 1, "", "What a sheet passes within, perpendicular; 0.98 and not 98"}};
const WholeKey kSheets{"sheets", {1, 8, "", ""}, 1};
const NumberKey kHaze{"haze", {0, 1, "", "A share, 0.7 and not 70"}, 0};
const NumberKey kOpaque{"opaque", {0, 1, "", "A share, 0.05 and not 5"}, 0};
const NumberKey kCoatingIndex{"coating_index", {1, 3, "", ""}};
const NumberKey kCoatingWave{"coating_nm", {100, 2000, "nm", ""}, 550};
const ChoiceKey<Coated> kCoated{
    "coated", {{"outer", Coated::outer}, {"inner", Coated::inner}, {"both", Coated::both}}, Coated::both};
const TextKey kInner{"inner", std::nullopt, "none"};
const NumberKey kValue{"value", {0, 1, "", "The share that is left, 0.95 and not 95"}};

[[noreturn]] void refuse(const TableReader& table, const CoverFault& fault) {
  table.refuse(fault.key, fault.what, fault.found, fault.remedy);
}

double required_number(TableReader& table, const NumberKey& key) {
  if (!table.has(key.name)) {
    table.refuse(key.name, "missing; a cover is made of sheets or measured", "",
                 "Give index, thickness_mm and absorption, or measured = \"<file>.csv\"");
  }
  return table.number(key);
}

double absorption_of(TableReader& table, double thickness_m) {
  if (table.has(kInternal.name) == table.has(kAbsorption.name)) {
    table.refuse(table.has(kInternal.name) ? kInternal.name : kAbsorption.name,
                 table.has(kInternal.name) ? "absorption is said twice"
                                           : "missing; how much the sheet absorbs must be said",
                 "", "Give either absorption, per metre, or internal, what one sheet passes within");
  }
  if (table.has(kAbsorption.name)) return table.number(kAbsorption);
  const double internal = table.number(kInternal);
  if (internal <= 0.0)
    table.refuse(kInternal.name, "must be above 0", plain(internal), kInternal.bounds.remedy);
  return internal == 1.0 ? 0.0 : -std::log(internal) / thickness_m;
}

void read_coating(TableReader& table, CoverSheet& sheet) {
  if (!table.has(kCoatingIndex.name)) {
    for (const std::string& name : {kCoated.name, kCoatingWave.name}) {
      if (table.has(name)) {
        table.refuse(name, "stands without a coating", "",
                     "Give coating_index, 1.28 for porous silica, or remove it");
      }
    }
    return;
  }
  CoverCoating coating;
  coating.index = table.number(kCoatingIndex);
  coating.quarter_wave_nm = table.number(kCoatingWave);
  const Coated coated = table.choice(kCoated);
  if (coated != Coated::inner) sheet.outer_coating = coating;
  if (coated != Coated::outer) sheet.inner_coating = coating;
}

// The sheets of a cover that stands above in the file, which hang below this one's.
void add_inner(TableReader& table, const std::vector<Cover>& above, CoverSheets& sheets) {
  if (!table.has(kInner.name)) return;
  const std::string name = table.text(kInner);
  std::vector<std::string> known;
  for (const Cover& cover : above) known.push_back(cover.name);
  const auto found = std::find(known.begin(), known.end(), name);
  if (found == known.end()) {
    table.refuse(kInner.name, "no cover of that name stands above in the file", in_quotes(name),
                 known.empty() ? "Write the inner cover first" : did_you_mean(name, known));
  }
  const Cover& inner = above[static_cast<std::size_t>(found - known.begin())];
  const auto* more = std::get_if<CoverSheets>(&inner.made_of);
  if (more == nullptr) {
    table.refuse(kInner.name,
                 "a measured cover cannot hang below another, since what it reflects is not known",
                 in_quotes(name), "Describe its sheets, or measure both together");
  }
  sheets.insert(sheets.end(), more->begin(), more->end());
}

CoverSheets read_sheets(TableReader& table, const std::vector<Cover>& above) {
  CoverSheet sheet;
  sheet.index = required_number(table, kIndex);
  sheet.thickness_m = required_number(table, kThickness) / 1000.0;
  if (!(sheet.thickness_m > 0.0)) table.refuse(kThickness.name, "must be above 0", "0", "");
  sheet.absorption_per_m = absorption_of(table, sheet.thickness_m);
  sheet.haze = table.number(kHaze);
  sheet.opaque = table.number(kOpaque);
  read_coating(table, sheet);
  CoverSheets sheets(static_cast<std::size_t>(table.whole(kSheets)), sheet);
  add_inner(table, above, sheets);
  return sheets;
}

CoverReadings read_measured(TableReader& table) {
  for (const KeyNote& key : cover_shape().keys) {
    if (table.has(key.name) && key.name != kMeasured.name && key.name != kSource.name) {
      table.refuse(key.name, "stands beside measured angles, which say all", "", "Remove it, or measured");
    }
  }
  return read_cover_angles(table.path(kMeasured));
}

Cover read_cover(TableReader& table, const std::string& name, const std::vector<Cover>& above) {
  Cover cover;
  cover.name = name;
  cover.source = table.text(kSource);
  if (table.has(kMeasured.name)) {
    cover.made_of = read_measured(table);
  } else {
    cover.made_of = read_sheets(table, above);
  }
  if (const auto fault = fault_of(cover)) refuse(table, *fault);
  table.finish();
  return cover;
}

CoverFactor read_factor(TableReader& table, const std::string& name) {
  if (!table.has(kValue.name)) table.refuse(kValue.name, "missing", "", kValue.bounds.remedy);
  CoverFactor factor{name, table.number(kValue), table.text(kSource)};
  if (!(factor.value > 0.0))
    table.refuse(kValue.name, "must be above 0", plain(factor.value), kValue.bounds.remedy);
  table.finish();
  return factor;
}

template <typename Item>
const Item& named(const std::vector<Item>& items, const std::string& what, const std::string& name,
                  const std::string& where) {
  std::vector<std::string> known;
  for (const Item& item : items) {
    if (item.name == name) return item;
    known.push_back(item.name);
  }
  throw Error(ErrorKind::plan, {"unknown " + what, where, in_quotes(name), did_you_mean(name, known)});
}

// Whatever stands in a group has a name of its own and is a table.
TableReader open_item(TableReader& group, const toml::table& root, const std::string& group_name,
                      const std::string& name) {
  const toml::node& node = *root.get_as<toml::table>(group_name)->get(name);
  if (!node.is_table()) {
    group.refuse(name, "must be a table", described(node), "Write [" + group_name + ".\"<name>\"]");
  }
  return group.own_table(name, "a table");
}

TableReader open_group(const toml::table& root, TableShape shape, Reading& reading) {
  const auto entry = root.find(shape.name);
  if (entry == root.end()) return {reading, std::move(shape), nullptr, 0};
  return {reading, std::move(shape), entry->second.as_table(), line_of(entry->first)};
}

}  // namespace

TableShape cover_shape() {
  return {"covers",
          {kSource, kMeasured, kIndex, kThickness, kAbsorption, kInternal, kSheets, kHaze, kOpaque,
           kCoatingIndex, kCoatingWave, kCoated, kInner}};
}

TableShape cover_factor_shape() { return {"factors", {kValue, kSource}}; }

CoverTable read_covers(const std::filesystem::path& path) {
  Reading reading{{path, "the covers file", "docs/covers.md"}, {}, {}};
  const toml::table root = parse_toml(read_plan_text(reading.file), reading.file);
  for (const toml::key& key : keys_in_order(root)) {
    const std::string name(key.str());
    const bool known = name == "covers" || name == "factors";
    if (known && root.get(name)->is_table()) continue;
    throw Error(
        ErrorKind::plan,
        {known ? "must be a table" : "unknown table or key",
         reading.file.where(line_of(key), joined_key("", name)), known ? described(*root.get(name)) : "",
         known ? "Write [" + name + ".\"<name>\"]" : did_you_mean(name, {"covers", "factors"})});
  }
  CoverTable all;
  all.file = path;
  TableReader covers = open_group(root, {"covers", {}, {cover_shape()}}, reading);
  for (const std::string& name : covers.own_names()) {
    TableReader table = open_item(covers, root, "covers", name);
    all.covers.push_back(read_cover(table, name, all.covers));
  }
  TableReader factors = open_group(root, {"factors", {}, {cover_factor_shape()}}, reading);
  for (const std::string& name : factors.own_names()) {
    TableReader table = open_item(factors, root, "factors", name);
    all.factors.push_back(read_factor(table, name));
  }
  return all;
}

const Cover& CoverTable::cover(const std::string& name, const std::string& where) const {
  return named(covers, "cover", name, where);
}

const CoverFactor& CoverTable::factor(const std::string& name, const std::string& where) const {
  return named(factors, "factor", name, where);
}

}  // namespace sunfall
