#pragma once
// What covers of greenhouses let through: glass, film, rigid plastic, nets and screens, described by what
// they are made of or by measured angles, and their transmittance against the angle of incidence. All values
// are for photosynthetic light, 400-700 nm, as shares (0 to 1) of the light that falls on the cover's plane.
//
// A regular part keeps its direction; a scattered part leaves the cover as a luminous plane. docs/method.md
// has the equations, docs/covers.md what they mean for a grower.

#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "sunfall/angle.h"

namespace sunfall {

// An anti-reflective layer without loss, a quarter of a wave thick at one wavelength, perpendicular.
struct CoverCoating {
  double index = 1.28;           // refractive index; 1 to 3
  double quarter_wave_nm = 550;  // in air; 100 to 2000
};

// One plane sheet with air on both sides, thick against a wavelength and thin against its width.
struct CoverSheet {
  double index = 1.526;           // refractive index; 1 to 3
  double thickness_m = 0.004;     // above 0 to 0.1
  double absorption_per_m = 0.0;  // 0 to 1e6; what passes a length L within is exp(-absorption L)
  double haze = 0.0;              // share of the transmitted light that is scattered, 0 to 1
  double opaque = 0.0;            // share of the area that is black (yarns, webs), from 0 to below 1
  std::optional<CoverCoating> outer_coating;
  std::optional<CoverCoating> inner_coating;
};

// Sheets with air gaps between, the outermost first; 1 to 8.
using CoverSheets = std::vector<CoverSheet>;

struct CoverReading {
  double angle_deg = 0.0;  // of incidence, from the perpendicular
  double regular = 0.0;
  double scattered = 0.0;
};
// In rising order from 0 to at least 60 and at most 90 degrees, three or more; at 90 degrees nothing passes.
using CoverReadings = std::vector<CoverReading>;

struct Cover {
  std::string name;
  std::variant<CoverSheets, CoverReadings> made_of;
  std::string source;  // of its values
};

// Dirt, condensation, age: what they leave, at all angles.
struct CoverFactor {
  std::string name;
  double value = 1.0;  // above 0 to 1
  std::string source;
};

// The first thing that makes a cover impossible; nothing where all is well.
struct CoverFault {
  std::string key;  // as in a table of covers: "index"
  std::string what;
  std::string found;
  std::string remedy;               // may be empty
  std::optional<std::size_t> item;  // which sheet or reading, from 0
};
std::optional<CoverFault> fault_of(const Cover& cover);

struct CoverPassage {
  double regular = 0.0;
  double scattered = 0.0;
  double total() const { return regular + scattered; }
};

// Throws Error(plan) for a cover that fault_of refuses and for a factor outside its range.
class CoverOptics {
 public:
  explicit CoverOptics(const Cover& cover, const std::vector<CoverFactor>& factors = {});

  // Unpolarised light at an angle from the perpendicular; from 90 degrees on nothing passes.
  CoverPassage at(Angle incidence) const;
  CoverPassage perpendicular() const { return at(Angle()); }
  // Light that comes evenly from the whole hemisphere before the cover. A result, never to be used for a
  // beam.
  const CoverPassage& hemispherical() const { return hemispherical_; }

 private:
  struct Source;
  std::shared_ptr<const Source> source_;
  double factor_ = 1.0;
  CoverPassage hemispherical_;
};

// A table of covers, such as the one that comes along (fields/covers.toml).
struct CoverTable {
  std::filesystem::path file;
  std::vector<Cover> covers;
  std::vector<CoverFactor> factors;

  // Throw Error(plan) for a name that the table lacks, with the nearest it has; `where` says who asked.
  const Cover& cover(const std::string& name, const std::string& where) const;
  const CoverFactor& factor(const std::string& name, const std::string& where) const;
};

// Throws Error(plan) for a fault in the table, Error(data) for one in a file of measured angles.
CoverTable read_covers(const std::filesystem::path& file);

// Columns angle, regular and scattered, and total where the file has it. Throws Error(data), Error(io).
CoverReadings read_cover_angles(const std::filesystem::path& file);

// The table that comes along: share/sunfall/covers.toml beside the program or where the library was
// installed, or that of the source tree. Throws Error(io) where there is none.
std::filesystem::path own_covers();

}  // namespace sunfall
