// SPDX-License-Identifier: Apache-2.0
// What a scene file states, as typed values that know their place in the file (format 1).
#pragma once

#include "diagnostics/position.h"
#include "math/vec.h"

#include <optional>
#include <string>
#include <vector>

namespace whorl::specimen {

/// A value with the place where the file states it; `given` is false for a default.
template <class T>
struct Stated {
  T value{};
  diagnostics::Position where{};
  bool given = false;
  operator const T&() const { return value; }
};

enum class Coiling { kDextral, kSinistral };
enum class Mineral { kAragonite, kCalcite };
/// g/cm3. Aragonite 2.93 (SSHADE database, mineral record Aragonite), calcite 2.7102 (Handbook of Mineralogy, sheet Calcite).
constexpr double mineral_density(Mineral mineral) { return mineral == Mineral::kAragonite ? 2.93 : 2.7102; }

enum class WallGrowth { kProportional, kConstant };
enum class SizeKind { kShellHeight, kShellWidth, kApertureHeight, kApertureWidth };
enum class Background { kWhite, kBlack, kClear };
enum class Letters { kNone, kUpper, kLower, kLowerInBrackets };
enum class Finish { kPlain, kPolished, kGlazed, kPeriostracum, kNacre };
enum class PanelLook { kNatural, kWhitened, kRadiograph };
/// How a plate draws what was not observed.
enum class Unobserved { kPlain, kTint, kHatch };
/// What a panel shows: the shell, the fill of its lumen, or that within the shell cut open.
enum class Shows { kShell, kMould, kBoth };
/// What of the shell is preserved in a stretch of growth. `kWall`: outside and inside; `kWhole`: the columella, too.
enum class PreservedParts { kWhole, kWall, kOutside, kInside };
enum class Quality { kDraft, kProof, kPrint };
enum class ViewName { kApertural, kAbapertural, kRightLateral, kLeftLateral, kApical, kUmbilical, kAxialSection, kFree };

/// sRGB as printed, 0 .. 255 a channel.
struct Colour {
  unsigned char red = 0, green = 0, blue = 0;
};

struct Identity {
  Stated<std::string> name, catalogue, author, locality, note, licence;
  Stated<Coiling> coiling;
  Stated<Mineral> mineral;
};

/// One expansion, or several by stages; stage whorls rise strictly. Between two stages ln W runs straight.
struct Stage {
  double whorl = 0.0, W = 1.0;
};
using Stages = std::vector<Stage>;  // one entry for a constant

struct Growth {
  Stated<double> whorls;
  Stated<Stages> W;
  Stated<double> D, T, start;
  std::optional<Stated<Stages>> W_distance, W_depth, W_section;
};

struct Lobe {
  Stated<double> at_deg, reach, width_deg;
};

struct Section {
  Stated<double> S, roll_deg;
  std::vector<Lobe> lobes;
};

struct Size {
  Stated<SizeKind> kind;
  Stated<double> mm;
};

struct Wall {
  Stated<double> thickness_mm;
  Stated<WallGrowth> growth;
  Stated<double> columella;  // pillar radius / aperture half-breadth
};

struct Lip {
  Stated<double> inclination_deg, thickness_mm;
};

struct Look {
  Stated<Colour> exterior, interior, section;
  Stated<double> gloss;
  std::optional<Stated<Colour>> lip, callus;
  Stated<double> lip_breadth_mm, callus_breadth_mm;
  Stated<Finish> exterior_finish, interior_finish;
  Stated<Colour> periostracum;  // of white shell under it
  Stated<Colour> mould;
};

struct Translucence {
  Stated<double> mean_free_path_mm, anisotropy;  // a path of 0: opaque
  Stated<Colour> colour;                         // of a deep wall
};

struct Nacre {
  Stated<double> tablet_nm, spread_nm, sheet_nm, sheet_index;
  Stated<int> layers;
  Stated<double> drift;
};

/// A stretch of growth in which the specimen is preserved. As stated: whorls from the pole, or back from the lip; `from` lies nearer
/// to the apex and may equal `to`. Without a value: the apex, the lip.
struct Preserved {
  std::optional<Stated<double>> from, to;
  Stated<bool> from_lip;
  Stated<PreservedParts> parts;
  diagnostics::Position where;
};

/// Colour laid down along the growing edge, from `onset` to `end` in whorls; growth is counted along growth lines.
struct Pigment {
  Stated<Colour> colour;
  Stated<double> opacity, fade, onset, end;
};

struct Band {
  Stated<double> at_deg, width_deg;
  Pigment pigment;
};

struct Flame {
  Stated<double> per_whorl, breadth, at_deg, width_deg, taper, sway, bends, irregularity;
  Stated<int> seed;
  Pigment pigment;
};

struct Spot {
  Stated<double> per_whorl, length, at_deg, width_deg, stagger, irregularity;
  Stated<int> seed;
  Pigment pigment;
};

/// Computed along the growing edge by an activator and its inhibitor; rates a whorl, spreads mm^2 a whorl.
struct EdgePattern {
  Stated<double> activator_decay, inhibitor_decay, source, activator_base, inhibitor_base;
  Stated<double> activator_spread, inhibitor_spread, variation, threshold;
  Stated<int> seed;
  Pigment pigment;
};

struct Colouring {
  std::vector<Band> bands;
  std::vector<Flame> flames;
  std::vector<Spot> spots;
  std::vector<EdgePattern> patterns;
};

/// Raised places fused with the wall; heights in mm at the lip (negative cuts), which go with a power of the whorl's size: `growth`.
struct Cord {
  Stated<double> at_deg, width_deg, height_mm, onset, end, growth;
};
struct Rib {
  Stated<double> per_whorl, height_mm, breadth, at_deg, width_deg, behind_lip, irregularity, onset, end;
  Stated<int> seed;
  Stated<double> growth;
};
struct Nodule {
  Stated<double> per_whorl, height_mm, length, at_deg, width_deg, behind_lip, irregularity, onset, end;
  Stated<int> seed;
  Stated<double> growth;
};
struct Sculpture {
  std::vector<Cord> cords;
  std::vector<Rib> ribs;
  std::vector<Nodule> nodules;
};

/// Where like things stand in growth: how many a whorl, one of them `behind_lip` whorls behind the lip.
struct Recurrence {
  Stated<double> per_whorl, behind_lip, irregularity, onset, end;
  Stated<int> seed;
  Stated<double> growth;
};

/// Solids that stand on the shell, each of its own colour; sizes in mm at the lip, which go with a power of the whorl's size: `growth`.
struct Stripe {
  Stated<double> at_deg, width_deg, height_mm, onset, end, growth;
  Stated<Colour> colour;
};
struct Lamella {
  Recurrence series;
  Stated<double> height_mm, thickness_mm, at_deg, width_deg, lean_deg;
  std::optional<Stated<Colour>> colour;  // none: that of the outside
};
struct Spine {
  Recurrence series;
  Stated<double> length_mm, breadth_mm, at_deg, tip, bend_deg, lean_deg, hollow, open_deg;
  std::optional<Stated<Colour>> colour;
};
enum class AttachedShape { kBead, kCone, kTube };
struct Attached {
  Stated<AttachedShape> shape;
  Recurrence series;
  Stated<int> rows;
  Stated<double> height_mm, breadth_mm, at_deg, width_deg, stagger, lean_deg;
  Stated<Colour> colour;
};
/// Another scene's shell at its own size, set down on this one.
enum class Pose { kUpright, kLying };  // axis of coiling along the surface's normal, or in the surface
struct Encruster {
  Stated<std::string> scene;  // its file, relative to this one's folder
  Stated<double> behind_lip, at_deg, turn_deg, sunk_mm;
  Stated<Pose> pose;
};
struct Attachments {
  std::vector<Stripe> stripes;
  std::vector<Lamella> lamellae;
  std::vector<Spine> spines;
  std::vector<Attached> attached;
  std::vector<Encruster> encrusters;
};

struct Light {
  Stated<double> azimuth_deg, elevation_deg, softness_deg, fill;
  Stated<double> stops;  // brightness of key and fill against the lamps
};

enum class LampShape { kBall, kRing };
struct Lamp {
  Stated<double> behind_lip, radius_mm, strength, temperature_k;
  Stated<double> offset_mm, at_deg;  // from the lumen's centre line, and towards where
  Stated<LampShape> shape;
  Stated<double> ring_mm;            // radius of a ring round that place
  Stated<int> bulbs;                 // balls on the ring
};

struct Panel {
  Stated<ViewName> view;
  double azimuth_deg = 0.0, elevation_deg = 0.0;  // for ViewName::kFree
  Stated<double> scale;                           // relative to the plate's common scale
  Stated<PanelLook> look;
  Stated<bool> stereo;                            // a pair of pictures
  Stated<Shows> shows;
};

struct Stereo {
  Stated<double> angle_deg, spacing_mm;  // between the eyes; between matching points on paper
};

struct Radiograph {
  Stated<double> energy_kev;
};

struct Plate {
  Stated<double> width_mm, resolution_ppi;
  Stated<Background> background;
  Stated<int> columns;
  Stated<double> gap_mm;
  Stated<Letters> letters;
  Stated<double> bar_mm;  // 0 = by the 1-2-5 rule
  Stated<Quality> quality;
  Stated<Unobserved> unobserved;
  Stated<double> hatch_mm;  // spacing of hatching on paper
  std::vector<Panel> panels;
};

/// The same shell over a grid of W and T; empty lists for none.
struct ContactSheet {
  Stated<std::vector<double>> W, T;
  bool wanted() const { return !W.value.empty() && !T.value.empty(); }
};

struct Specimen {
  std::string source;  // the file's name as given, "-" for standard input
  std::string text;    // its bytes, as read
  Identity identity;
  Growth growth;
  Section section;
  Size size;
  Wall wall;
  Lip lip;
  std::vector<Preserved> preserved;  // none: nothing is said of it
  Look look;
  Nacre nacre;
  Translucence translucence;
  Colouring colouring;
  Sculpture sculpture;
  Attachments attachments;
  Light light;
  std::vector<Lamp> lamps;
  Radiograph radiograph;
  Stereo stereo;
  ContactSheet contact_sheet;
  Plate plate;
};

}  // namespace whorl::specimen
