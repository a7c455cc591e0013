// SPDX-License-Identifier: Apache-2.0
// Embree 3 (Debian 12) and 4 (Debian 13) behind one face. No other file asks for the version.
#pragma once

#if WHORL_EMBREE_MAJOR >= 4
#include <embree4/rtcore.h>
#else
#include <embree3/rtcore.h>
#endif

namespace whorl::trace::embree {

/// What travels with a ray to the callbacks: derive from it. The library's own context comes first.
struct Payload {
#if WHORL_EMBREE_MAJOR >= 4
  RTCRayQueryContext context;
#else
  RTCIntersectContext context;
#endif
};

/// The thread sanitizer cannot see into the library's own threads: under it the hierarchy is built by the caller alone.
#if defined(__SANITIZE_THREAD__)
inline constexpr const char* kDeviceSettings = "threads=1,user_threads=1";
#else
inline constexpr const char* kDeviceSettings = nullptr;
#endif

inline void prepare(Payload& payload) {
#if WHORL_EMBREE_MAJOR >= 4
  rtcInitRayQueryContext(&payload.context);
#else
  rtcInitIntersectContext(&payload.context);
#endif
}

inline void trace_closest(RTCScene scene, RTCRayHit& ray, Payload& payload) {
#if WHORL_EMBREE_MAJOR >= 4
  RTCIntersectArguments arguments;
  rtcInitIntersectArguments(&arguments);
  arguments.context = &payload.context;
  rtcIntersect1(scene, &ray, &arguments);
#else
  rtcIntersect1(scene, &payload.context, &ray);
#endif
}

inline void trace_any(RTCScene scene, RTCRay& ray, Payload& payload) {
#if WHORL_EMBREE_MAJOR >= 4
  RTCOccludedArguments arguments;
  rtcInitOccludedArguments(&arguments);
  arguments.context = &payload.context;
  rtcOccluded1(scene, &ray, &arguments);
#else
  rtcOccluded1(scene, &payload.context, &ray);
#endif
}

/// Tells the library whether a callback has hit (version 4 asks for it, version 3 has nothing to tell).
template <class Arguments>
inline void report(const Arguments* arguments, bool hit) {
#if WHORL_EMBREE_MAJOR >= 4
  arguments->valid[0] = hit ? -1 : 0;
#else
  (void)arguments;
  (void)hit;
#endif
}

}  // namespace whorl::trace::embree
