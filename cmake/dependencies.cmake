# SPDX-License-Identifier: Apache-2.0
# Finds the third-party libraries; what differs between Debian 12 and 13 is settled here.
find_package(Threads REQUIRED)
# By pkg-config: Debian's CMake files of Imath and OpenImageIO insist on tools and Python modules that nothing here needs.
find_package(PkgConfig REQUIRED)
pkg_check_modules(IMATH REQUIRED IMPORTED_TARGET Imath)
pkg_check_modules(OIIO REQUIRED IMPORTED_TARGET OpenImageIO)
pkg_check_modules(FREETYPE REQUIRED IMPORTED_TARGET freetype2)
find_package(TBB REQUIRED)
find_package(fmt REQUIRED)
find_package(nlohmann_json REQUIRED)
find_package(CLI11 REQUIRED)
find_package(OpenSSL REQUIRED COMPONENTS Crypto)

# toml++ is header-only; some packages ship only the header, which is enough.
find_package(tomlplusplus QUIET)
if(tomlplusplus_FOUND)
  set(WHORL_TOML tomlplusplus::tomlplusplus)
else()
  find_path(WHORL_TOML_INCLUDE toml++/toml.h REQUIRED)
  add_library(whorl_toml INTERFACE)
  target_include_directories(whorl_toml SYSTEM INTERFACE ${WHORL_TOML_INCLUDE})
  set(WHORL_TOML whorl_toml)
endif()

# Embree 4 where there is one (Debian 13), else 3 (Debian 12). trace/embree_shim.h hides the difference.
find_package(embree 4 QUIET)
if(embree_FOUND)
  set(WHORL_EMBREE_MAJOR 4)
else()
  find_package(embree 3.12 REQUIRED)
  set(WHORL_EMBREE_MAJOR 3)
endif()
add_library(whorl_embree INTERFACE)
target_link_libraries(whorl_embree INTERFACE embree)
target_compile_definitions(whorl_embree INTERFACE WHORL_EMBREE_MAJOR=${WHORL_EMBREE_MAJOR})
set(WHORL_EMBREE whorl_embree)

# Least squares for fitting: 2.1 in Debian 12, 2.2 in Debian 13. It brings Eigen.
find_package(Ceres REQUIRED)
